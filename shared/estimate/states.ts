import { COUNT_STATES, NOT_VISITED, valueOf, type CellCount, type CountState } from "#shared/counts/count.ts";
import type { MissingPick } from "./result.ts";

interface PickOfCell {
  readonly order: number;
  readonly unit: number;
  readonly label: string;
}

interface PicksWithCounts {
  readonly picks: readonly PickOfCell[];
  readonly closedPicks: readonly PickOfCell[];
  readonly counts: ReadonlyMap<number, CellCount>;
}

const byOrder = (a: { readonly order: number }, b: { readonly order: number }): number => a.order - b.order;

/** The picks without a value, by name, in draw order; closed ones too, because a reserve doesn't make them known. */
export function missingPicks({ picks, closedPicks, counts }: PicksWithCounts): MissingPick[] {
  const known = (unit: number): CellCount => counts.get(unit) ?? NOT_VISITED;
  const open = picks
    .filter((pick) => !valueOf(known(pick.unit)).known)
    .map(({ order, unit, label }) => ({ order, unit, label, state: known(unit).state, closed: false }));
  const closed = closedPicks.map(({ order, unit, label }) => ({
    order,
    unit,
    label,
    state: known(unit).state,
    closed: true,
  }));
  return [...open, ...closed].sort(byOrder);
}

/** How many picks and cells are in each state, states that occur only, in the fixed order of the states. */
export function stateNumbers({
  picks,
  closedPicks,
  counts,
}: PicksWithCounts): { state: CountState; picks: number; cells: number }[] {
  const all = [...picks, ...closedPicks];
  return COUNT_STATES.flatMap((state) => {
    const inState = all.filter((pick) => (counts.get(pick.unit) ?? NOT_VISITED).state === state);
    const cells = new Set(inState.map((pick) => pick.unit)).size;
    return inState.length === 0 ? [] : [{ state, picks: inState.length, cells }];
  });
}

/**
 * Picks with a value behind the first pick in use that was not visited yet. Above zero the counts are not the first so many
 * of the draw, and what crews reach first may differ from the rest.
 */
export function countedOutOfOrder({ picks, counts }: PicksWithCounts): number {
  const ordered = picks.toSorted(byOrder);
  const first = ordered.findIndex((pick) => (counts.get(pick.unit) ?? NOT_VISITED).state === "not-visited");
  if (first === -1) return 0;
  return ordered.slice(first).filter((pick) => valueOf(counts.get(pick.unit) ?? NOT_VISITED).known).length;
}
