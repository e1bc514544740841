import { ReadingPage } from "../../components/ui/ReadingPage.tsx";

export function DrawPage() {
  return (
    <ReadingPage title="Draw">
      <></>
    </ReadingPage>
  );
}
