import { cellCount, type CountStanding, type EntrySays } from "#shared/counts/in-force.ts";
import type { EntriesInUse } from "#shared/field/in-use.ts";
import { type DrawnPick, type EstimateInput, estimateFromCounts } from "./from-counts.ts";
import type { EstimateResult } from "./result.ts";

/** One stratum's list of a draw with the names of its cells, and what is in use of it. */
export interface ListOfDraw {
  readonly entries: readonly { readonly position: number; readonly unit: number; readonly label: string }[];
  readonly use: Pick<EntriesInUse, "inUse" | "closed" | "passedOver">;
}

/** A draw with its counts, and what was declared with it. */
export interface DrawWithCounts extends Pick<EstimateInput, "design" | "units" | "countIn" | "areaM2" | "limits"> {
  readonly lists: readonly ListOfDraw[];
  readonly standing: ReadonlyMap<number, CountStanding<EntrySays>>;
  /** The declared level as decimal text, "0.95". */
  readonly level: string;
}

/**
 * The estimate of a draw as it stands: the picks in use with the counts in force, beside them what was closed or passed over
 * and what was amended away. The server and the replay of a record both call it, each with what they hold themselves.
 * @throws Problem `estimate-impossible` as estimateFromCounts does
 */
export function estimateOfDraw({ lists, standing, level, ...rest }: DrawWithCounts): EstimateResult {
  return estimateFromCounts({
    ...rest,
    level: Number(level),
    picks: lists.flatMap((list) => picksAt(list, list.use.inUse)),
    closedPicks: lists.flatMap((list) => picksAt(list, [...list.use.closed, ...list.use.passedOver])),
    counts: new Map([...standing].map(([unit, { inForce }]) => [unit, cellCount(inForce)])),
    countedBefore: new Map(
      [...standing].flatMap(([unit, { countedBefore }]) => (countedBefore === null ? [] : [[unit, countedBefore]])),
    ),
  });
}

/** The entries at these positions, in draw order. */
function picksAt({ entries }: ListOfDraw, at: readonly { readonly position: number }[]): DrawnPick[] {
  const wanted = new Set(at.map(({ position }) => position));
  return entries
    .filter(({ position }) => wanted.has(position))
    .map(({ position, unit, label }) => ({ order: position, unit, label }));
}
