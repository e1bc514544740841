import type { Survey } from "#shared/api/surveys.ts";
import { ButtonLink } from "../components/ui/ButtonLink.tsx";
import { formatList } from "../components/ui/format.ts";
import { ReadingPage } from "../components/ui/ReadingPage.tsx";

interface NotForRoleProps {
  readonly survey: Survey;
  readonly stage: string;
  /** The first stage that this person works on. */
  readonly first: string;
}

/** An address that this person's roles do not reach. */
export function NotForRole({ survey, stage, first }: NotForRoleProps) {
  return (
    <ReadingPage
      title={`The ${stage} stage is not for your role.`}
      lead={`In ${survey.name} you are ${formatList(survey.roles)}. Ask a planner of the survey if you need more.`}
    >
      <div>
        <ButtonLink to={first}>To your own stage</ButtonLink>
      </div>
    </ReadingPage>
  );
}
