import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";

/** Working out how many cells are enough comes with a later version; until then this page says what to do without it. */
export function PlanPage() {
  const survey = useCurrentSurvey();
  return (
    <ReadingPage
      title="How many cells are enough?"
      lead="This version does not work that out yet. Decide on a number of picks yourself and say it on the Draw stage."
      margin={
        <MarginNote title="Why it matters">
          The spread between cells decides how sure the total can be, and only cells that were counted show it.
        </MarginNote>
      }
    >
      <Section title="Without a plan">
        <ul className="grid max-w-[68ch] list-disc gap-2 pl-5">
          <li>Four times the picks halve the standard error, whatever the size of the area.</li>
          <li>Few picks leave the spread itself unsure: below about thirty, take the limits as rough.</li>
          <li>Draw more reserves than you expect to need; they are opened strictly in order.</li>
        </ul>
      </Section>
      <div>
        <ButtonLink to={paths.stage(survey.id, "draw")}>Go to the Draw stage</ButtonLink>
      </div>
    </ReadingPage>
  );
}
