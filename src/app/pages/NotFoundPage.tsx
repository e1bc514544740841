import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { paths } from "../paths.ts";
import { PlainShell } from "../PlainShell.tsx";

export function NotFoundPage() {
  return (
    <PlainShell here="Nothing here">
      <ReadingPage
        title="There is no page at this address."
        lead="A letter may be missing at its end, or the page was moved."
      >
        <div>
          <ButtonLink to={paths.surveys}>To the surveys</ButtonLink>
        </div>
      </ReadingPage>
    </PlainShell>
  );
}
