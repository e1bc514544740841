import { reach } from "#shared/access/table.ts";
import { FieldStage } from "../../features/field/FieldStage.tsx";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";

export function FieldPage() {
  const survey = useCurrentSurvey();
  return (
    <FieldStage
      surveyId={survey.id}
      surveyName={survey.name}
      safetyNotes={survey.safetyNotes}
      mayAssign={reach(survey.roles, "field.assign") !== "none"}
      mayClose={reach(survey.roles, "field.close") !== "none"}
      mayExport={reach(survey.roles, "field.export") !== "none"}
      mayEnter={reach(survey.roles, "counts.enter") !== "none"}
      ownOnly={reach(survey.roles, "survey.see") === "own"}
      drawTo={paths.stage(survey.id, "draw")}
      countsTo={paths.stage(survey.id, "counts")}
    />
  );
}
