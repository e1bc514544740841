import { reach } from "#shared/access/table.ts";
import { CountsStage } from "../../features/counts/CountsStage.tsx";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";

export function CountsPage() {
  const survey = useCurrentSurvey();
  const [target] = survey.targets;
  if (target === undefined) throw new RangeError(`survey ${survey.id} has no target`);
  return (
    <CountsStage
      surveyId={survey.id}
      target={target}
      mayEnter={reach(survey.roles, "counts.enter") !== "none"}
      mayAmend={reach(survey.roles, "counts.amend") !== "none"}
      mayImport={reach(survey.roles, "counts.import") !== "none"}
      drawTo={reach(survey.roles, "draw.make") === "none" ? null : paths.stage(survey.id, "draw")}
    />
  );
}
