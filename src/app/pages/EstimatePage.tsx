import { ReadingPage } from "../../components/ui/ReadingPage.tsx";

export function EstimatePage() {
  return (
    <ReadingPage title="Estimate">
      <></>
    </ReadingPage>
  );
}
