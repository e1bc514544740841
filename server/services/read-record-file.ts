import type { Context } from "../context.ts";
import { newestEvent } from "../db/events.ts";
import { findSurvey } from "../db/surveys.ts";
import { buildRecord } from "./build-record.ts";
import { fileNamePart } from "./file-name-part.ts";

/** The record file as it is saved; its name tells up to which event it goes. */
export function readRecordFile(ctx: Context): { name: string; text: string } {
  const survey = findSurvey(ctx.db, ctx.surveyId)?.name ?? "survey";
  const sequence = newestEvent(ctx.db, ctx.surveyId)?.sequence ?? 0;
  return {
    name: `${fileNamePart(survey)}-record-${sequence}.json`,
    text: JSON.stringify(buildRecord(ctx, ctx.surveyId)),
  };
}
