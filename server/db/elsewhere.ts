import { and, countDistinct, eq, inArray, ne } from "drizzle-orm";
import type { Reader } from "./open.ts";
import { areaVersions } from "./schema/area.ts";
import { frameVersions } from "./schema/frame.ts";

/** How many other surveys of this installation have a boundary file, or a sealed frame, of this survey. */
export interface Elsewhere {
  readonly sameSource: number;
  readonly sameFrame: number;
}

export function elsewhereOf(reader: Reader, surveyId: string): Elsewhere {
  const files = reader
    .select({ sha256: areaVersions.fileSha256 })
    .from(areaVersions)
    .where(eq(areaVersions.surveyId, surveyId));
  const frames = reader
    .select({ sha256: frameVersions.frameSha256 })
    .from(frameVersions)
    .where(eq(frameVersions.surveyId, surveyId));
  const sources = reader
    .select({ n: countDistinct(areaVersions.surveyId) })
    .from(areaVersions)
    .where(and(ne(areaVersions.surveyId, surveyId), inArray(areaVersions.fileSha256, files)))
    .get();
  const sealed = reader
    .select({ n: countDistinct(frameVersions.surveyId) })
    .from(frameVersions)
    .where(and(ne(frameVersions.surveyId, surveyId), inArray(frameVersions.frameSha256, frames)))
    .get();
  return { sameSource: sources?.n ?? 0, sameFrame: sealed?.n ?? 0 };
}
