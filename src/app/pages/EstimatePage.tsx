import { reach } from "#shared/access/table.ts";
import { EstimateStage } from "../../features/estimate/EstimateStage.tsx";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";

export function EstimatePage() {
  const survey = useCurrentSurvey();
  return (
    <EstimateStage
      surveyId={survey.id}
      surveyName={survey.name}
      mayKeep={reach(survey.roles, "estimate.keep") !== "none"}
      countsTo={paths.stage(survey.id, "counts")}
    />
  );
}
