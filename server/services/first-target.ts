import type { Reader } from "../db/open.ts";
import { type TargetRow, targetsOf } from "../db/surveys.ts";

/** What a survey counts; the first of its targets where there are several. */
export function firstTarget(reader: Reader, surveyId: string): TargetRow {
  const [first] = targetsOf(reader, surveyId);
  if (!first) throw new Error(`survey ${surveyId} has no target`);
  return first;
}
