import { ReadingPage } from "../../components/ui/ReadingPage.tsx";

export function RecordPage() {
  return (
    <ReadingPage title="Record">
      <></>
    </ReadingPage>
  );
}
