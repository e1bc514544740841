import { isClosing, type VisitState } from "#shared/field/states.ts";
import type { CellCount } from "./count.ts";

/** What a count entry says of its cell: a number where it was counted, none in every other state. */
export interface EntrySays {
  readonly state: VisitState;
  readonly value: number | null;
}

/** How a cell stands after all its entries. */
export interface CountStanding<Entry extends EntrySays> {
  readonly inForce: Entry;
  /** The number that was in force before an amendment to a closing state took it away; null where none was. */
  readonly countedBefore: number | null;
}

/** An entry as the estimators take it. @throws RangeError for a counted cell without a number. */
export function cellCount({ state, value }: EntrySays): Exclude<CellCount, { state: "not-visited" }> {
  if (state !== "counted") return { state };
  if (value === null) throw new RangeError("a counted cell has a number");
  return { state, value };
}

/**
 * How each cell stands, told from the first counts of one target and their amendments in the order in which they came: the last
 * entry is in force. Units without an entry are not in the answer: they were not visited yet.
 */
export function countsInForce<Entry extends EntrySays>(
  entries: Iterable<readonly [unit: number, entry: Entry]>,
): Map<number, CountStanding<Entry>> {
  const standing = new Map<number, CountStanding<Entry>>();
  for (const [unit, inForce] of entries) {
    standing.set(unit, { inForce, countedBefore: takenAway(standing.get(unit), inForce) });
  }
  return standing;
}

/** The number that an entry takes out of the estimate: the one in force before, or one that was taken away earlier. */
function takenAway(before: CountStanding<EntrySays> | undefined, { state }: EntrySays): number | null {
  if (before === undefined || !isClosing(state)) return null;
  if (isClosing(before.inForce.state)) return before.countedBefore;
  return before.inForce.state === "not-in-population" ? 0 : before.inForce.value;
}
