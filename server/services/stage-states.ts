import { STAGES, type StageState } from "#shared/api/surveys.ts";
import type { Reader } from "../db/open.ts";

/** How each stage of a survey stands, at a glance. */
export function stageStates(_reader: Reader, _surveyId: string): StageState[] {
  return STAGES.map((stage) => ({ stage, state: "not-started", note: "not started" }));
}
