import type { ListedSurvey } from "#shared/api/surveys.ts";
import type { OwnersWaiting } from "#shared/api/waiting.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { FirstDay } from "../../features/surveys/FirstDay.tsx";
import { OtherSurveys } from "../../features/surveys/OtherSurveys.tsx";
import { useSurveys } from "../../features/surveys/queries.ts";
import type { SurveyRow } from "../../features/surveys/SurveyList.tsx";
import { WaitingList } from "../../features/surveys/WaitingList.tsx";
import { YourSurveys } from "../../features/surveys/YourSurveys.tsx";
import { paths } from "../paths.ts";
import { PlainShell } from "../PlainShell.tsx";
import { STAGE_NAMES, stageThatMatters, stations } from "../stages.ts";
import { useAccount } from "../use-account.ts";
import { urgentFirst, waitingForOwners, waitingIn, waitingLead, waitingTitle } from "../waiting.ts";

function useRows(surveys: readonly ListedSurvey[]): SurveyRow[] {
  const times = useTimes();
  return surveys.map((survey) => {
    const stage = stageThatMatters(survey.roles, survey.stages);
    const note = stage === undefined ? "" : `${STAGE_NAMES[stage.stage]}: ${stage.note}`;
    const isArchived = survey.archivedAt !== null;
    return {
      survey,
      to: paths.survey(survey.id),
      stations: stations(survey.id, survey.roles, survey.stages),
      note: survey.archivedAt === null ? note : `Archived on ${times.day(survey.archivedAt)}`,
      attention: !isArchived && stage?.state === "attention",
    };
  });
}

interface LoadedSurveysProps {
  readonly surveys: readonly ListedSurvey[];
  readonly installation: OwnersWaiting | null;
}

function LoadedSurveys({ surveys, installation }: LoadedSurveysProps) {
  const rows = useRows(surveys);
  const start = (
    <ButtonLink variant="primary" to={paths.newSurvey}>
      Start a survey
    </ButtonLink>
  );
  const ofOwners = waitingForOwners(installation);
  if (surveys.length === 0) {
    return (
      <>
        <FirstDay actions={start} />
        {ofOwners.length > 0 && (
          <>
            <h2 className="mt-11">{waitingTitle(ofOwners.length)}</h2>
            <WaitingList items={ofOwners} />
          </>
        )}
      </>
    );
  }
  const waiting = urgentFirst([...waitingIn(surveys), ...ofOwners]);
  return (
    <>
      <div className="q-surveys-top">
        <div>
          <h1>{waitingTitle(waiting.length)}</h1>
          <p>{waitingLead(waiting)}</p>
        </div>
        {start}
      </div>
      {waiting.length > 0 && <WaitingList items={waiting} />}
      <YourSurveys rows={rows} />
    </>
  );
}

export function SurveysPage() {
  const surveys = useSurveys();
  const account = useAccount();
  return (
    <PlainShell here="Surveys">
      <div className="q-surveys">
        {surveys.isPending && <RuledLoading label="Loading the surveys" lines={5} />}
        {surveys.isError && (
          <Refusal error={surveys.error} next={<Button onClick={() => void surveys.refetch()}>Try again</Button>} />
        )}
        {surveys.data !== undefined && <LoadedSurveys {...surveys.data} />}
        {surveys.data !== undefined && account.isOwner && <OtherSurveys peopleOf={paths.people} />}
      </div>
    </PlainShell>
  );
}
