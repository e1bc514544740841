import type { Context } from "../context.ts";
import type { Tx } from "../db/open.ts";
import { openVisits } from "../db/visits.ts";
import { newId } from "./new-id.ts";

interface Where {
  readonly seasonId: string;
  readonly frameId: string;
  readonly at: string;
}

/** Opens one visit for each cell among the entries; a cell that is to be visited already keeps its visit. */
export function openVisitsFor(
  tx: Tx,
  ctx: Context,
  { seasonId, frameId, at }: Where,
  entries: readonly { readonly unit: number; readonly column: number; readonly row: number }[],
): void {
  const cells = new Map(entries.map(({ unit, column, row }) => [unit, { unit, column, row }]));
  openVisits(
    tx,
    [...cells.values()].map((cell) => ({
      id: newId(ctx),
      surveyId: ctx.surveyId,
      seasonId,
      frameVersionId: frameId,
      ...cell,
      openedAt: at,
    })),
  );
}
