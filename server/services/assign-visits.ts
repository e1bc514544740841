import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import type { Context } from "../context.ts";
import { membersOf } from "../db/members.ts";
import { type Reader, writeTx } from "../db/open.ts";
import { assign, unassign, type VisitRow } from "../db/visits.ts";
import { actingMember } from "./acting-member.ts";
import { visitHere } from "./keep-entry.ts";
import { recordEvent } from "./record-event.ts";

interface Wanted {
  readonly visitIds: readonly string[];
  /** null takes the cells back. */
  readonly memberId: string | null;
  readonly day: string;
}

/** Roles that go out and count. */
const FIELD_ROLES: ReadonlySet<Role> = new Set(["planner", "lead", "counter"]);

/** Gives cells to a member for a day, or takes them back; all or none. Returns how many cells. */
export function assignVisits(ctx: Context, wanted: Wanted): number {
  const acting = actingMember(ctx);
  return writeTx(ctx.db, (tx) => {
    const visits = [...new Set(wanted.visitIds)].map((id) => visitHere(tx, ctx.surveyId, id));
    const { memberId, day } = wanted;
    if (memberId !== null) expectFieldRole(tx, ctx.surveyId, memberId);
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

function expectFieldRole(reader: Reader, surveyId: string, memberId: string): void {
  const rows = membersOf(reader, surveyId).filter((row) => row.id === memberId);
  const [first] = rows;
  if (!first) throw new Problem("not-found", "This person holds no role in the survey. Choose somebody from the list.");
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
