import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import type { AssignmentsNow } from "#shared/api/field.ts";
import type { Context } from "../context.ts";
import { membersOf } from "../db/members.ts";
import { type Reader, writeTx } from "../db/open.ts";
import { assign, type AssignmentRow, assignmentsOf, unassign, type VisitRow } from "../db/visits.ts";
import { actingMember } from "./acting-member.ts";
import { framePlaces } from "./frame-places.ts";
import { visitHere } from "./keep-entry.ts";
import { recordEvent } from "./record-event.ts";

interface Wanted {
  readonly visitIds: readonly string[];
  /** null takes the cells back. */
  readonly memberId: string | null;
  readonly day: string;
  /** Who had these cells when they were chosen; those that are not named here were seen with nobody. */
  readonly seen: readonly Seen[];
}

type Seen = Pick<AssignmentRow, "visitId" | "memberId" | "day">;

/** Roles that go out and count. */
const FIELD_ROLES: ReadonlySet<Role> = new Set(["planner", "lead", "counter"]);

/**
 * Gives cells to a member for a day, or takes them back; all or none. Returns how many cells.
 * @throws Problem `changed-meanwhile` where somebody else has a cell now than was seen, with who that is
 */
export function assignVisits(ctx: Context, wanted: Wanted): number {
  const acting = actingMember(ctx);
  return writeTx(ctx.db, (tx) => {
    const visits = [...new Set(wanted.visitIds)].map((id) => visitHere(tx, ctx.surveyId, id));
    const { memberId, day } = wanted;
    if (memberId !== null) expectFieldRole(tx, ctx.surveyId, memberId);
    expectAsSeen(tx, ctx.surveyId, visits, wanted);
    const at = ctx.now().toISOString();
    if (memberId === null) {
      unassign(
        tx,
        visits.map((visit) => visit.id),
      );
    } else {
      for (const visit of visits) assign(tx, { visitId: visit.id, memberId, day, assignedAt: at });
    }
    for (const [frameId, units] of unitsByFrame(visits)) {
      recordEvent(tx, ctx, {
        surveyId: ctx.surveyId,
        at,
        memberId: acting,
        kind: "cells-assigned",
        payload: { version: 1, frameId, units, member: memberId, day },
      });
    }
    return visits.length;
  });
}

/** A cell that has become what is wanted is nothing to ask about. */
function expectAsSeen(reader: Reader, surveyId: string, visits: readonly VisitRow[], wanted: Wanted): void {
  const now = new Map(assignmentsOf(reader, surveyId).map((row) => [row.visitId, row]));
  const seen = new Map(wanted.seen.map((row) => [row.visitId, row]));
  const changed = visits.filter(({ id }) => {
    const current = now.get(id);
    return !isSame(current, seen.get(id)) && !isSame(current, wanted.memberId === null ? undefined : wanted);
  });
  if (changed.length === 0) return;
  const labels = new Map([...unitsByFrame(changed).keys()].map((id) => [id, framePlaces(reader, id)]));
  const current: AssignmentsNow = changed.map((visit) => {
    const { memberId, name, day } = now.get(visit.id) ?? {};
    const assignedTo = memberId === undefined || name === undefined ? null : { memberId, name, day: day ?? "" };
    const label = labels.get(visit.frameVersionId)?.labelOf(visit.column, visit.row) ?? "";
    return { visitId: visit.id, label, assignedTo };
  });
  const about = changed.length === 1 ? `Cell ${current[0]?.label ?? ""} was` : `${changed.length} cells were`;
  throw new Problem(
    "changed-meanwhile",
    `${about} shared out by somebody else. Look who has ${changed.length === 1 ? "it" : "them"} now, then decide.`,
    { kind: "versions", current },
  );
}

function isSame(
  a: { readonly memberId: string | null; readonly day: string } | undefined,
  b: { readonly memberId: string | null; readonly day: string } | undefined,
): boolean {
  return a?.memberId === b?.memberId && a?.day === b?.day;
}

function expectFieldRole(reader: Reader, surveyId: string, memberId: string): void {
  const rows = membersOf(reader, surveyId).filter((row) => row.id === memberId);
  const [first] = rows;
  if (!first) throw new Problem("not-found", "This person holds no role in the survey. Choose somebody from the list.");
  if (first.closedAt !== null) {
    throw new Problem("account-closed", `${first.name} can't sign in any more. Choose somebody else.`);
  }
  if (rows.some((row) => FIELD_ROLES.has(row.role))) return;
  throw new Problem(
    "not-allowed",
    `${first.name} is ${first.role} here and counts no cells. Give them the counter's role first.`,
  );
}

/** Cells of one frame are numbered alike; as a rule all are of one. */
function unitsByFrame(visits: readonly VisitRow[]): Map<string, number[]> {
  const frames = new Map<string, number[]>();
  for (const visit of visits) {
    const units = frames.get(visit.frameVersionId);
    if (units) units.push(visit.unit);
    else frames.set(visit.frameVersionId, [visit.unit]);
  }
  return frames;
}
