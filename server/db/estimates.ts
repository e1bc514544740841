import { asc, desc, eq, sql } from "drizzle-orm";
import type { Reader, Tx } from "./open.ts";
import { keptEstimates } from "./schema/record.ts";

export type KeptEstimateRow = typeof keptEstimates.$inferSelect;

export function insertKeptEstimate(tx: Tx, row: KeptEstimateRow): void {
  tx.insert(keptEstimates).values(row).run();
}

/** Oldest first. */
export function keptEstimatesOf(reader: Reader, surveyId: string): KeptEstimateRow[] {
  return reader
    .select()
    .from(keptEstimates)
    .where(eq(keptEstimates.surveyId, surveyId))
    .orderBy(asc(sql`${keptEstimates}.rowid`))
    .all();
}

/** When the newest estimate of a survey was kept, or null. */
export function newestKeptAt(reader: Reader, surveyId: string): string | null {
  const row = reader
    .select({ at: keptEstimates.keptAt })
    .from(keptEstimates)
    .where(eq(keptEstimates.surveyId, surveyId))
    .orderBy(desc(sql`${keptEstimates}.rowid`))
    .limit(1)
    .get();
  return row?.at ?? null;
}
