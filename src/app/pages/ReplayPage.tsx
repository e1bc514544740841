import { ReadingPage } from "../../components/ui/ReadingPage.tsx";

export function ReplayPage() {
  return (
    <ReadingPage title="Replay">
      <></>
    </ReadingPage>
  );
}
