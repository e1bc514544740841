import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { type CountRow, entryInForce } from "../db/counts.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { actingMember } from "./acting-member.ts";
import { cellName, checkSaid, inWords, keepEntry, keptBefore, type Said, valueOf, visitHere } from "./keep-entry.ts";
import { expectOwn, ownCells } from "./own-cells.ts";

export interface NewCount {
  /** Made by the client. */
  readonly id: string;
  readonly visitId: string;
  readonly targetId: string;
  readonly said: Said;
  readonly note: string;
  readonly madeAt: string;
  /** Who counted, where it was somebody else than whoever writes it down. */
  readonly observerId?: string;
}

/** Writes down first counts, all or none; an entry that is sent twice is kept once. */
export function enterCounts(ctx: Context, wanted: readonly NewCount[]): void {
  writeTx(ctx.db, (tx) => {
    const own = ownCells(ctx, tx);
    for (const count of wanted) {
      const visit = visitHere(tx, ctx.surveyId, count.visitId);
      // Asked first: what was kept stays kept, and is answered so, even where the cell went to somebody else since.
      if (keptBefore(tx, firstEntry(ctx, count, null))) continue;
      if (!own.has(visit.id)) expectOwn(own, visit.id, `Cell ${cellName(tx, visit)}`);
      keepFirstCount(tx, ctx, count, null);
    }
  });
}

/**
 * Keeps the first count of a cell and target.
 * @throws Problem `count-exists` where there is one: it is amended, never written over.
 */
export function keepFirstCount(tx: Tx, ctx: Context, count: NewCount, importId: string | null): void {
  const visit = visitHere(tx, ctx.surveyId, count.visitId);
  const row = firstEntry(ctx, count, importId);
  if (keptBefore(tx, row)) return;
  checkSaid(tx, ctx.surveyId, count.targetId, count.said, visit);
  const inForce = entryInForce(tx, visit.id, count.targetId);
  if (inForce) {
    throw new Problem(
      "count-exists",
      `Cell ${cellName(tx, visit)} has one: ${inWords(inForce)}, of ${inForce.madeAt}. Amend it, with a reason.`,
    );
  }
  keepEntry(tx, ctx, visit, row);
}

/** A first count as the row that keeps it. */
function firstEntry(ctx: Context, count: NewCount, importId: string | null): CountRow {
  const memberId = actingMember(ctx);
  return {
    id: count.id,
    visitId: count.visitId,
    targetId: count.targetId,
    observerId: count.observerId ?? memberId,
    purpose: "first",
    state: count.said.state,
    value: valueOf(count.said),
    replaces: null,
    reason: "",
    note: count.note,
    importId,
    enteredBy: memberId,
    enteredAt: ctx.now().toISOString(),
    madeAt: count.madeAt,
  };
}
