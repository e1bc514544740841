import { ReadingPage } from "../../components/ui/ReadingPage.tsx";

export function CountsPage() {
  return (
    <ReadingPage title="Counts">
      <></>
    </ReadingPage>
  );
}
