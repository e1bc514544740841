import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { endSeasonDraws, insertWithdrawn } from "../db/draws.ts";
import { writeTx } from "../db/open.ts";
import { actingMember } from "./acting-member.ts";
import { neededDraw } from "./read-draws.ts";
import { recordEvent } from "./record-event.ts";

/** Takes a draw out of use, with a reason. Its picks stay on record, and what was counted in its cells. */
export function withdrawDraw(ctx: Context, drawId: string, reason: string): void {
  const memberId = actingMember(ctx);
  writeTx(ctx.db, (tx) => {
    const { withdrawn } = neededDraw(tx, drawId);
    if (withdrawn !== null) {
      throw new Problem("draw-withdrawn", `It was withdrawn at ${withdrawn.withdrawnAt}. Declare a new draw.`);
    }
    const at = ctx.now().toISOString();
    insertWithdrawn(tx, { drawId, reason, withdrawnBy: memberId, withdrawnAt: at });
    endSeasonDraws(tx, drawId, at);
    recordEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId,
      kind: "draw-withdrawn",
      payload: { version: 1, drawId, reason },
    });
  });
}
