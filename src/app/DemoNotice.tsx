/** The line that every page of the demo carries. */
export function DemoNotice() {
  return (
    <>
      <b>This is the demo.</b> Its surveys are invented and stay on this computer. Keep real counts in an installation
      of your own.
    </>
  );
}
