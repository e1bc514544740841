import { ReadingPage } from "../../components/ui/ReadingPage.tsx";

export function FieldPage() {
  return (
    <ReadingPage title="Field">
      <></>
    </ReadingPage>
  );
}
