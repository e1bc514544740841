import { isClosing, type VisitState } from "#shared/field/states.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { type CountRow, entryInForce } from "../db/counts.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { insertPickAct, type VisitRow } from "../db/visits.ts";
import { actingMember } from "./acting-member.ts";
import { listInUseWith } from "./draw-in-use.ts";
import {
  bringsValue,
  cellName,
  checkSaid,
  inWords,
  keepEntry,
  keptBefore,
  type Said,
  valueOf,
  visitHere,
} from "./keep-entry.ts";
import { seasonInUse } from "./read-visits.ts";

interface Amendment {
  readonly id: string;
  readonly targetId: string;
  /** The entry that was in force when the amendment was written. */
  readonly replaces: string;
  readonly said: Said;
  readonly note: string;
  readonly reason: string;
  readonly madeAt: string;
}

/** Puts another entry in the place of the one in force; the old one stays, with who, when and why. */
export function amendCount(ctx: Context, visitId: string, wanted: Amendment): void {
  writeTx(ctx.db, (tx) => {
    const visit = visitHere(tx, ctx.surveyId, visitId);
    const inForce = entryInForce(tx, visitId, wanted.targetId);
    if (!inForce) {
      throw new Problem("count-missing", `Nothing is written down for cell ${cellName(tx, visit)}. Enter its count.`);
    }
    const row: CountRow = {
      id: wanted.id,
      visitId,
      targetId: wanted.targetId,
      observerId: inForce.observerId,
      purpose: "first",
      state: wanted.said.state,
      value: valueOf(wanted.said),
      replaces: wanted.replaces,
      reason: wanted.reason,
      note: wanted.note,
      importId: null,
      enteredBy: actingMember(ctx),
      enteredAt: ctx.now().toISOString(),
      madeAt: wanted.madeAt,
    };
    if (keptBefore(tx, row)) return;
    checkSaid(tx, ctx.surveyId, wanted.targetId, wanted.said, visit);
    if (inForce.id !== wanted.replaces) {
      throw new Problem(
        "changed-meanwhile",
        `In force for cell ${cellName(tx, visit)} is now: ${inWords(inForce)}. Reload the page, then amend that.`,
      );
    }
    keepEntry(tx, ctx, visit, row);
    keepPicksInStep(tx, ctx, visit, inForce.state, row);
  });
}

/**
 * A counted cell that is amended to a closing state leaves the picks in use and opens no reserve; a closed cell that was
 * counted after all is in use again, and the reserves that it opened stay.
 */
function keepPicksInStep(tx: Tx, ctx: Context, visit: VisitRow, before: VisitState, row: CountRow): void {
  const { live, lists, seasonId } = seasonInUse(tx, ctx.surveyId);
  if (live?.draw.frameVersionId !== visit.frameVersionId || seasonId !== visit.seasonId) return;
  const list = listInUseWith(lists, visit.unit);
  if (!list) return;
  const closed = list.use.closed.some((entry) => entry.unit === visit.unit);
  const leaves = bringsValue(before) && isClosing(row.state) && !closed;
  const comesBack = bringsValue(row.state) && closed;
  if (!leaves && !comesBack) return;
  insertPickAct(tx, {
    drawId: live.draw.id,
    seasonId,
    kind: leaves ? "close-counted" : "reopen",
    stratum: list.stratum,
    unit: visit.unit,
    count: null,
    state: isClosing(row.state) ? row.state : null,
    reason: row.reason,
    actedBy: row.enteredBy,
    actedAt: row.enteredAt,
  });
}
