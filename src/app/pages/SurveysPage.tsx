import type { SurveySummary } from "#shared/api/surveys.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { FirstDay } from "../../features/surveys/FirstDay.tsx";
import { OtherSurveys } from "../../features/surveys/OtherSurveys.tsx";
import { useSurveys } from "../../features/surveys/queries.ts";
import { SurveyList, type SurveyRow } from "../../features/surveys/SurveyList.tsx";
import { WaitingList } from "../../features/surveys/WaitingList.tsx";
import { paths } from "../paths.ts";
import { PlainShell } from "../PlainShell.tsx";
import { STAGE_NAMES, stageThatMatters, stations } from "../stages.ts";
import { useAccount } from "../use-account.ts";
import { waitingIn, waitingTitle } from "../waiting.ts";

function rowOf(survey: SurveySummary): SurveyRow {
  const stage = stageThatMatters(survey.roles, survey.stages);
  return {
    survey,
    to: paths.survey(survey.id),
    stations: stations(survey.id, survey.roles, survey.stages),
    note: stage === undefined ? "" : `${STAGE_NAMES[stage.stage]}: ${stage.note}`,
    attention: stage?.state === "attention",
  };
}

function LoadedSurveys({ surveys }: { readonly surveys: readonly SurveySummary[] }) {
  const start = (
    <ButtonLink variant="primary" to={paths.newSurvey}>
      Start a survey
    </ButtonLink>
  );
  if (surveys.length === 0) return <FirstDay actions={start} />;
  const waiting = surveys.map(waitingIn).filter((item) => item !== null);
  return (
    <>
      <div className="q-surveys-top">
        <div>
          <h1>{waitingTitle(waiting.length)}</h1>
          <p>
            {waiting.length === 0
              ? "Your surveys are below, open to read."
              : waiting.length === 1
                ? "It is the next step of a survey in which you have a part."
                : "Each of them is the next step of a survey in which you have a part."}
          </p>
        </div>
        {start}
      </div>
      {waiting.length > 0 && <WaitingList items={waiting} />}
      <h2 className="q-surveys-head">Your surveys</h2>
      <SurveyList rows={surveys.map(rowOf)} />
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
        {surveys.data !== undefined && <LoadedSurveys surveys={surveys.data} />}
        {surveys.data !== undefined && account.isOwner && <OtherSurveys peopleOf={paths.people} />}
      </div>
    </PlainShell>
  );
}
