import { and, asc, count, desc, eq, gt, isNull, max, sql } from "drizzle-orm";
import type { Reader, Tx } from "./open.ts";
import {
  declarations,
  declarationsAbandoned,
  drawEntries,
  draws,
  drawsWithdrawn,
  seasonDraws,
  seeds,
} from "./schema/draw.ts";
import { frameVersions } from "./schema/frame.ts";

export type DeclarationRow = typeof declarations.$inferSelect;
export type AbandonedRow = typeof declarationsAbandoned.$inferSelect;
export type SeedRow = typeof seeds.$inferSelect;
export type DrawRow = typeof draws.$inferSelect;
export type EntryRow = typeof drawEntries.$inferSelect;
export type WithdrawnRow = typeof drawsWithdrawn.$inferSelect;
export type SeasonDrawRow = typeof seasonDraws.$inferSelect;

/** A declaration and how it stands: its seed, its end, the draw it became. */
export interface DeclarationState {
  readonly declaration: DeclarationRow;
  readonly seed: SeedRow | null;
  readonly abandoned: AbandonedRow | null;
  readonly drawId: string | null;
  readonly frameNumber: number;
  readonly units: number;
}

/** A draw and how it stands. */
export interface DrawState {
  readonly draw: DrawRow;
  readonly withdrawn: WithdrawnRow | null;
}

/** Rows that go into one INSERT: SQLite allows 32,766 values. */
const ROWS_AT_ONCE = 1000;

function declarationStates(reader: Reader) {
  return reader
    .select({
      declaration: declarations,
      seed: seeds,
      abandoned: declarationsAbandoned,
      drawId: draws.id,
      frameNumber: frameVersions.number,
      units: frameVersions.units,
    })
    .from(declarations)
    .innerJoin(frameVersions, eq(frameVersions.id, declarations.frameVersionId))
    .leftJoin(seeds, eq(seeds.declarationId, declarations.id))
    .leftJoin(declarationsAbandoned, eq(declarationsAbandoned.declarationId, declarations.id))
    .leftJoin(draws, eq(draws.declarationId, declarations.id))
    .$dynamic();
}

function withUnits(row: Omit<DeclarationState, "units"> & { readonly units: number | null }): DeclarationState {
  if (row.units === null) throw new Error(`declaration ${row.declaration.id} is on a frame that is not sealed`);
  return { ...row, units: row.units };
}

/** Newest first. */
export function declarationsOf(reader: Reader, surveyId: string): DeclarationState[] {
  return declarationStates(reader)
    .where(eq(declarations.surveyId, surveyId))
    .orderBy(desc(sql`${declarations}.rowid`))
    .all()
    .map(withUnits);
}

export function findDeclaration(reader: Reader, id: string): DeclarationState | undefined {
  const row = declarationStates(reader).where(eq(declarations.id, id)).get();
  return row && withUnits(row);
}

/** The declaration of a season that has neither become a draw nor been abandoned: at most one. */
export function openDeclaration(reader: Reader, seasonId: string): DeclarationState | undefined {
  const row = declarationStates(reader)
    .where(and(eq(declarations.seasonId, seasonId), isNull(draws.id), isNull(declarationsAbandoned.declarationId)))
    .get();
  return row && withUnits(row);
}

export function insertDeclaration(tx: Tx, row: DeclarationRow): void {
  tx.insert(declarations).values(row).run();
}

export function insertAbandoned(tx: Tx, row: AbandonedRow): void {
  tx.insert(declarationsAbandoned).values(row).run();
}

export function insertSeed(tx: Tx, row: SeedRow): void {
  tx.insert(seeds).values(row).run();
}

/** How many seeds were given in a survey after a moment. */
export function seedsSince(reader: Reader, surveyId: string, after: string): number {
  const row = reader
    .select({ n: count() })
    .from(seeds)
    .innerJoin(declarations, eq(declarations.id, seeds.declarationId))
    .where(and(eq(declarations.surveyId, surveyId), gt(seeds.givenAt, after)))
    .get();
  return row?.n ?? 0;
}

function drawStates(reader: Reader) {
  return reader
    .select({ draw: draws, withdrawn: drawsWithdrawn })
    .from(draws)
    .leftJoin(drawsWithdrawn, eq(drawsWithdrawn.drawId, draws.id))
    .$dynamic();
}

/** Newest first. */
export function drawsOf(reader: Reader, surveyId: string): DrawState[] {
  return drawStates(reader).where(eq(draws.surveyId, surveyId)).orderBy(desc(draws.number)).all();
}

export function findDraw(reader: Reader, id: string): DrawState | undefined {
  return drawStates(reader).where(eq(draws.id, id)).get();
}

/** The draw that a season uses now. */
export function liveDraw(reader: Reader, seasonId: string): DrawState | undefined {
  return drawStates(reader)
    .innerJoin(seasonDraws, eq(seasonDraws.drawId, draws.id))
    .where(and(eq(seasonDraws.seasonId, seasonId), isNull(seasonDraws.endedAt)))
    .get();
}

export function nextDrawNumber(reader: Reader, surveyId: string): number {
  const row = reader
    .select({ last: max(draws.number) })
    .from(draws)
    .where(eq(draws.surveyId, surveyId))
    .get();
  return (row?.last ?? 0) + 1;
}

/** How many draws were ever made on a frame version, withdrawn ones too. */
export function drawsOnFrame(reader: Reader, frameId: string): number {
  return reader.select({ n: count() }).from(draws).where(eq(draws.frameVersionId, frameId)).get()?.n ?? 0;
}

export function insertDraw(tx: Tx, row: DrawRow, entries: readonly EntryRow[]): void {
  tx.insert(draws).values(row).run();
  insertEntries(tx, entries);
}

export function insertEntries(tx: Tx, entries: readonly EntryRow[]): void {
  for (let at = 0; at < entries.length; at += ROWS_AT_ONCE) {
    tx.insert(drawEntries)
      .values(entries.slice(at, at + ROWS_AT_ONCE))
      .run();
  }
}

/** In draw order, stratum by stratum. */
export function entriesOf(reader: Reader, drawId: string): EntryRow[] {
  return reader
    .select()
    .from(drawEntries)
    .where(eq(drawEntries.drawId, drawId))
    .orderBy(asc(drawEntries.stratum), asc(drawEntries.position))
    .all();
}

export function insertWithdrawn(tx: Tx, row: WithdrawnRow): void {
  tx.insert(drawsWithdrawn).values(row).run();
}

export function insertSeasonDraw(tx: Tx, row: SeasonDrawRow): void {
  tx.insert(seasonDraws).values(row).run();
}

/** Takes a draw out of use in every season that uses it. */
export function endSeasonDraws(tx: Tx, drawId: string, endedAt: string): void {
  tx.update(seasonDraws)
    .set({ endedAt })
    .where(and(eq(seasonDraws.drawId, drawId), isNull(seasonDraws.endedAt)))
    .run();
}

/** Oldest first. */
export function seasonDrawsOf(reader: Reader, surveyId: string): SeasonDrawRow[] {
  return reader
    .select({
      id: seasonDraws.id,
      seasonId: seasonDraws.seasonId,
      drawId: seasonDraws.drawId,
      takenAt: seasonDraws.takenAt,
      endedAt: seasonDraws.endedAt,
    })
    .from(seasonDraws)
    .innerJoin(draws, eq(draws.id, seasonDraws.drawId))
    .where(eq(draws.surveyId, surveyId))
    .orderBy(asc(sql`${seasonDraws}.rowid`))
    .all();
}

/** The season that used this draw last; a draw is taken into a season when it is made. */
export function seasonOfDraw(reader: Reader, drawId: string): string {
  const row = reader
    .select({ seasonId: seasonDraws.seasonId })
    .from(seasonDraws)
    .where(eq(seasonDraws.drawId, drawId))
    .orderBy(desc(sql`${seasonDraws}.rowid`))
    .limit(1)
    .get();
  if (!row) throw new Error(`draw ${drawId} was never taken into a season`);
  return row.seasonId;
}
