import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { insertAbandoned } from "../db/draws.ts";
import { writeTx } from "../db/open.ts";
import { actingMember } from "./acting-member.ts";
import { neededDeclaration } from "./read-draws.ts";
import { recordEvent } from "./record-event.ts";

/** Ends a declaration without a draw, with a reason; it stays on record, and its seed where there is one. */
export function abandonDeclaration(ctx: Context, declarationId: string, reason: string): void {
  const memberId = actingMember(ctx);
  writeTx(ctx.db, (tx) => {
    const { drawId, abandoned } = neededDeclaration(tx, declarationId);
    if (drawId !== null) {
      throw new Problem("declaration-closed", "Cells were drawn from it: withdraw the draw if it must not be used.");
    }
    if (abandoned !== null) {
      throw new Problem("declaration-closed", `It was abandoned at ${abandoned.abandonedAt}. Declare a new draw.`);
    }
    const at = ctx.now().toISOString();
    insertAbandoned(tx, { declarationId, reason, abandonedBy: memberId, abandonedAt: at });
    recordEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId,
      kind: "declaration-abandoned",
      payload: { version: 1, declarationId, reason },
    });
  });
}
