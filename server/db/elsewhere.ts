import { and, eq, inArray, isNotNull, ne } from "drizzle-orm";
import type { Reader } from "./open.ts";
import { areaVersions } from "./schema/area.ts";
import { frameVersions } from "./schema/frame.ts";
import { deletedSurveys } from "./schema/installation.ts";

/** How many other surveys of this installation have, or had before they were deleted, a boundary file or a sealed frame of this one. */
export interface Elsewhere {
  readonly sameSource: number;
  readonly sameFrame: number;
}

/** SHA-256 of a survey's boundary files and of its sealed frames. */
export interface StandsOn {
  readonly sourceSha256s: string[];
  readonly frameSha256s: string[];
}

export function standsOn(reader: Reader, surveyId: string): StandsOn {
  const files = reader
    .selectDistinct({ sha256: areaVersions.fileSha256 })
    .from(areaVersions)
    .where(eq(areaVersions.surveyId, surveyId))
    .all();
  const frames = reader
    .selectDistinct({ sha256: frameVersions.frameSha256 })
    .from(frameVersions)
    .where(and(eq(frameVersions.surveyId, surveyId), isNotNull(frameVersions.frameSha256)))
    .all();
  return {
    sourceSha256s: files.map(({ sha256 }) => sha256),
    frameSha256s: frames.flatMap(({ sha256 }) => (sha256 === null ? [] : [sha256])),
  };
}

export function elsewhereOf(reader: Reader, surveyId: string): Elsewhere {
  const here = standsOn(reader, surveyId);
  const sources = reader
    .selectDistinct({ surveyId: areaVersions.surveyId })
    .from(areaVersions)
    .where(and(ne(areaVersions.surveyId, surveyId), inArray(areaVersions.fileSha256, here.sourceSha256s)))
    .all();
  const sealed = reader
    .selectDistinct({ surveyId: frameVersions.surveyId })
    .from(frameVersions)
    .where(and(ne(frameVersions.surveyId, surveyId), inArray(frameVersions.frameSha256, here.frameSha256s)))
    .all();
  const deleted = reader.select().from(deletedSurveys).all();
  const among = (had: readonly string[], own: readonly string[]): boolean => had.some((sha256) => own.includes(sha256));
  return {
    sameSource: sources.length + deleted.filter((row) => among(row.sourceSha256s, here.sourceSha256s)).length,
    sameFrame: sealed.length + deleted.filter((row) => among(row.frameSha256s, here.frameSha256s)).length,
  };
}
