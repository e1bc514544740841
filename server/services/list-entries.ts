import type { Context } from "../context.ts";
import { type CountRow, entriesOfVisit } from "../db/counts.ts";
import { memberNames } from "../db/members.ts";
import { expectOwn, ownCells } from "./own-cells.ts";

export interface EntriesView {
  readonly entries: readonly CountRow[];
  readonly names: ReadonlyMap<string, string>;
}

/** All that was ever written down for one cell, oldest first. */
export function listEntries(ctx: Context, visitId: string): EntriesView {
  expectOwn(ownCells(ctx, ctx.db), visitId, "This cell");
  return { entries: entriesOfVisit(ctx.db, visitId), names: memberNames(ctx.db, ctx.surveyId) };
}
