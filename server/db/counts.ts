import { and, asc, eq, isNull, sql } from "drizzle-orm";
import { alias } from "drizzle-orm/sqlite-core";
import type { Reader, Tx } from "./open.ts";
import { countEntries, countImports } from "./schema/counts.ts";
import { visits } from "./schema/field.ts";

export type CountRow = typeof countEntries.$inferSelect;
export type CountImportRow = typeof countImports.$inferSelect;

/** As they were written, whatever the clock did meanwhile. */
const inOrder = asc(sql`${countEntries}.rowid`);

export function findEntry(reader: Reader, id: string): CountRow | undefined {
  return reader.select().from(countEntries).where(eq(countEntries.id, id)).get();
}

export function insertEntry(tx: Tx, row: CountRow): void {
  tx.insert(countEntries).values(row).run();
}

/** All that was ever written down for one cell, oldest first. */
export function entriesOfVisit(reader: Reader, visitId: string): CountRow[] {
  return reader.select().from(countEntries).where(eq(countEntries.visitId, visitId)).orderBy(inOrder).all();
}

const later = alias(countEntries, "later");

/** The entry in force for one cell and target: the first count, or the last amendment of it. */
export function entryInForce(reader: Reader, visitId: string, targetId: string): CountRow | undefined {
  return reader
    .select({ entry: countEntries })
    .from(countEntries)
    .leftJoin(later, eq(later.replaces, countEntries.id))
    .where(
      and(
        eq(countEntries.visitId, visitId),
        eq(countEntries.targetId, targetId),
        eq(countEntries.purpose, "first"),
        isNull(later.id),
      ),
    )
    .get()?.entry;
}

/** The entries in force for one target in a season, by visit. */
export function entriesInForce(reader: Reader, seasonId: string, targetId: string): Map<string, CountRow> {
  const rows = reader
    .select({ entry: countEntries })
    .from(countEntries)
    .innerJoin(visits, eq(visits.id, countEntries.visitId))
    .leftJoin(later, eq(later.replaces, countEntries.id))
    .where(
      and(
        eq(visits.seasonId, seasonId),
        eq(countEntries.targetId, targetId),
        eq(countEntries.purpose, "first"),
        isNull(later.id),
      ),
    )
    .all();
  return new Map(rows.map(({ entry }) => [entry.visitId, entry]));
}

/** First counts of one target in a season and their amendments, as they came. */
export function firstCountsOf(reader: Reader, seasonId: string, targetId: string): CountRow[] {
  return reader
    .select({ entry: countEntries })
    .from(countEntries)
    .innerJoin(visits, eq(visits.id, countEntries.visitId))
    .where(and(eq(visits.seasonId, seasonId), eq(countEntries.targetId, targetId), eq(countEntries.purpose, "first")))
    .orderBy(inOrder)
    .all()
    .map((row) => row.entry);
}

/** Every entry of a survey, oldest first. */
export function entriesOfSurvey(reader: Reader, surveyId: string): CountRow[] {
  return reader
    .select({ entry: countEntries })
    .from(countEntries)
    .innerJoin(visits, eq(visits.id, countEntries.visitId))
    .where(eq(visits.surveyId, surveyId))
    .orderBy(inOrder)
    .all()
    .map((row) => row.entry);
}

/** When the first count of a season was written down, or null. */
export function firstCountAt(reader: Reader, seasonId: string): string | null {
  const row = reader
    .select({ at: countEntries.enteredAt })
    .from(countEntries)
    .innerJoin(visits, eq(visits.id, countEntries.visitId))
    .where(eq(visits.seasonId, seasonId))
    .orderBy(asc(countEntries.enteredAt))
    .limit(1)
    .get();
  return row?.at ?? null;
}

export function insertImport(tx: Tx, row: CountImportRow): void {
  tx.insert(countImports).values(row).run();
}

/** Oldest first. */
export function importsOf(reader: Reader, surveyId: string): CountImportRow[] {
  return reader
    .select()
    .from(countImports)
    .where(eq(countImports.surveyId, surveyId))
    .orderBy(asc(sql`${countImports}.rowid`))
    .all();
}
