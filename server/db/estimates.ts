import { asc, eq, sql } from "drizzle-orm";
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
