import { reach } from "#shared/access/table.ts";
import { AreaStage } from "../../features/area/AreaStage.tsx";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";

export function AreaPage() {
  const survey = useCurrentSurvey();
  return (
    <AreaStage
      surveyId={survey.id}
      surveyName={survey.name}
      mayChange={reach(survey.roles, "area.change") !== "none"}
      mayReadFiles={reach(survey.roles, "record.read") !== "none"}
      frameTo={paths.stage(survey.id, "frame")}
    />
  );
}
