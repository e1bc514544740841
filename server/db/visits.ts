import { and, asc, eq, inArray, max } from "drizzle-orm";
import type { Reader, Tx } from "./open.ts";
import { accounts, members } from "./schema/accounts.ts";
import { draws } from "./schema/draw.ts";
import { assignments, pickActs, visits } from "./schema/field.ts";

export type VisitRow = typeof visits.$inferSelect;
export type PickActRow = typeof pickActs.$inferSelect;
export type AssignmentRow = typeof assignments.$inferSelect;

const ROWS_AT_ONCE = 1000;

/** Opens visits; a cell that is to be visited already keeps the one it has. */
export function openVisits(tx: Tx, rows: readonly VisitRow[]): void {
  for (let at = 0; at < rows.length; at += ROWS_AT_ONCE) {
    tx.insert(visits)
      .values(rows.slice(at, at + ROWS_AT_ONCE))
      .onConflictDoNothing()
      .run();
  }
}

export function findVisit(reader: Reader, id: string): VisitRow | undefined {
  return reader.select().from(visits).where(eq(visits.id, id)).get();
}

/** The visits of a season on a frame version, by unit. */
export function visitsOn(reader: Reader, seasonId: string, frameId: string): VisitRow[] {
  return reader
    .select()
    .from(visits)
    .where(and(eq(visits.seasonId, seasonId), eq(visits.frameVersionId, frameId)))
    .orderBy(asc(visits.unit))
    .all();
}

/** Every visit of a survey, oldest first. */
export function visitsOf(reader: Reader, surveyId: string): VisitRow[] {
  return reader
    .select()
    .from(visits)
    .where(eq(visits.surveyId, surveyId))
    .orderBy(asc(visits.openedAt), asc(visits.frameVersionId), asc(visits.unit))
    .all();
}

/** In order. */
export function pickActsOf(reader: Reader, drawId: string, seasonId: string): PickActRow[] {
  return reader
    .select()
    .from(pickActs)
    .where(and(eq(pickActs.drawId, drawId), eq(pickActs.seasonId, seasonId)))
    .orderBy(asc(pickActs.sequence))
    .all();
}

/** Appends an act to those of its draw and season. */
export function insertPickAct(tx: Tx, row: Omit<PickActRow, "sequence">): void {
  const here = and(eq(pickActs.drawId, row.drawId), eq(pickActs.seasonId, row.seasonId));
  const last = tx
    .select({ last: max(pickActs.sequence) })
    .from(pickActs)
    .where(here)
    .get();
  tx.insert(pickActs)
    .values({ ...row, sequence: (last?.last ?? 0) + 1 })
    .run();
}

export interface AssignmentView {
  readonly visitId: string;
  readonly memberId: string;
  readonly name: string;
  readonly day: string;
  readonly assignedAt: string;
}

/** Who goes to which cell, of all visits of a survey. */
export function assignmentsOf(reader: Reader, surveyId: string): AssignmentView[] {
  return reader
    .select({
      visitId: assignments.visitId,
      memberId: assignments.memberId,
      name: accounts.name,
      day: assignments.day,
      assignedAt: assignments.assignedAt,
    })
    .from(assignments)
    .innerJoin(visits, eq(visits.id, assignments.visitId))
    .innerJoin(members, eq(members.id, assignments.memberId))
    .innerJoin(accounts, eq(accounts.id, members.accountId))
    .where(eq(visits.surveyId, surveyId))
    .orderBy(asc(assignments.assignedAt), asc(assignments.visitId))
    .all();
}

/** The visits that are assigned to one member. */
export function visitIdsAssignedTo(reader: Reader, memberId: string): Set<string> {
  const rows = reader
    .select({ visitId: assignments.visitId })
    .from(assignments)
    .where(eq(assignments.memberId, memberId))
    .all();
  return new Set(rows.map((row) => row.visitId));
}

export function assign(tx: Tx, row: AssignmentRow): void {
  const { memberId, day, assignedAt } = row;
  tx.insert(assignments)
    .values(row)
    .onConflictDoUpdate({ target: assignments.visitId, set: { memberId, day, assignedAt } })
    .run();
}

export function unassign(tx: Tx, visitIds: readonly string[]): void {
  tx.delete(assignments)
    .where(inArray(assignments.visitId, [...visitIds]))
    .run();
}

/** Every act on the draws of a survey, in order within each draw. */
export function allPickActs(reader: Reader, surveyId: string): PickActRow[] {
  return reader
    .select({ act: pickActs })
    .from(pickActs)
    .innerJoin(draws, eq(draws.id, pickActs.drawId))
    .where(eq(draws.surveyId, surveyId))
    .orderBy(asc(draws.number), asc(pickActs.seasonId), asc(pickActs.sequence))
    .all()
    .map((row) => row.act);
}
