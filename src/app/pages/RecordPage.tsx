import { RecordStage } from "../../features/record/RecordStage.tsx";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";

export function RecordPage() {
  const survey = useCurrentSurvey();
  return <RecordStage surveyId={survey.id} replayTo={paths.replay} />;
}
