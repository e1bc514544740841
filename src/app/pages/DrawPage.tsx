import { reach } from "#shared/access/table.ts";
import { DrawStage } from "../../features/draw/DrawStage.tsx";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";

export function DrawPage() {
  const survey = useCurrentSurvey();
  return (
    <DrawStage
      surveyId={survey.id}
      mayDraw={reach(survey.roles, "draw.make") !== "none"}
      mayRepeat={reach(survey.roles, "record.read") !== "none"}
      frameTo={paths.stage(survey.id, "frame")}
      recordTo={paths.stage(survey.id, "record")}
      fieldTo={paths.stage(survey.id, "field")}
    />
  );
}
