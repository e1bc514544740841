import { TimeZoneContext } from "../../components/ui/use-times.ts";
import { RecordStage } from "../../features/record/RecordStage.tsx";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";

/** Times of a record are read as they were hashed: in UTC. */
export function RecordPage() {
  const survey = useCurrentSurvey();
  return (
    <TimeZoneContext value="UTC">
      <RecordStage surveyId={survey.id} replayTo={paths.replay} />
    </TimeZoneContext>
  );
}
