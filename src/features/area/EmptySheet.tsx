/** The sheet while there is no boundary: nothing but its grid. */
export function EmptySheet({ text }: { readonly text: string }) {
  return (
    <div className="q-empty-sheet">
      <div>
        <p>{text}</p>
      </div>
    </div>
  );
}
