import { Navigate } from "react-router-dom";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";
import { stagesFor, stageThatMatters } from "../stages.ts";

/** A survey's own address leads to the stage that matters now. */
export function FirstStage() {
  const survey = useCurrentSurvey();
  const stage = stageThatMatters(survey.roles, survey.stages)?.stage ?? stagesFor(survey.roles)[0] ?? "area";
  return <Navigate to={paths.stage(survey.id, stage)} replace />;
}
