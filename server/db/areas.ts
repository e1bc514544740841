import { desc, eq } from "drizzle-orm";
import type { SurveySummary } from "#shared/api/surveys.ts";
import type { Reader } from "./open.ts";
import { areaVersions } from "./schema/area.ts";

/** The outline of the newest area version in degrees, or null while there is none. */
export function newestOutline(reader: Reader, surveyId: string): SurveySummary["outline"] {
  const row = reader
    .select({ outline: areaVersions.outline })
    .from(areaVersions)
    .where(eq(areaVersions.surveyId, surveyId))
    .orderBy(desc(areaVersions.number))
    .limit(1)
    .get();
  return (row?.outline as SurveySummary["outline"] | undefined) ?? null;
}
