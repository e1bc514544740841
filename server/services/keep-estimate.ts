import { Problem } from "#shared/problem.ts";
import { canonicalSha256 } from "#shared/record/chain.ts";
import type { Context } from "../context.ts";
import { insertKeptEstimate, type KeptEstimateRow, keptEstimatesOf } from "../db/estimates.ts";
import { memberNames } from "../db/members.ts";
import { writeTx } from "../db/open.ts";
import { actingMember } from "./acting-member.ts";
import { newId } from "./new-id.ts";
import { readEstimate } from "./read-estimate.ts";
import { recordEvent } from "./record-event.ts";

export interface KeptEstimateView {
  readonly row: KeptEstimateRow;
  readonly resultSha256: string;
  readonly names: ReadonlyMap<string, string>;
}

/** Puts the estimate as it stands on record, if it is the one that was seen. */
export function keepEstimate(ctx: Context, seenSha256: string): KeptEstimateView {
  const memberId = actingMember(ctx);
  return writeTx(ctx.db, (tx) => {
    const { result, resultSha256, season, target, draw, declaration } = readEstimate(ctx, tx);
    if (resultSha256 !== seenSha256) {
      throw new Problem(
        "changed-meanwhile",
        "Counts came in since you looked. Reload the estimate, then keep what you see.",
      );
    }
    const at = ctx.now().toISOString();
    const row: KeptEstimateRow = {
      id: newId(ctx),
      surveyId: ctx.surveyId,
      seasonId: season.id,
      targetId: target.id,
      settings: {
        drawId: draw.draw.id,
        declarationSha256: declaration.state.declaration.sha256,
        limits: declaration.declared.limits,
        level: declaration.declared.level,
        software: `Quillet ${ctx.version}`,
      },
      result,
      keptBy: memberId,
      keptAt: at,
    };
    insertKeptEstimate(tx, row);
    recordEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId,
      kind: "estimate-kept",
      payload: { version: 1, estimateId: row.id, targetId: target.id, seasonId: season.id, resultSha256 },
    });
    return { row, resultSha256, names: memberNames(tx, ctx.surveyId) };
  });
}

/** The estimates on record, newest first. */
export function listKeptEstimates(ctx: Context): KeptEstimateView[] {
  const names = memberNames(ctx.db, ctx.surveyId);
  return keptEstimatesOf(ctx.db, ctx.surveyId)
    .toReversed()
    .map((row) => ({ row, resultSha256: canonicalSha256(row.result), names }));
}
