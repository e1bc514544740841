import type { EntriesInUse } from "./in-use.ts";
import type { VisitState } from "./states.ts";

export interface CompletePrefix {
  /** The first so many positions of the list are settled: counted, not in the population, closed or passed over. */
  readonly complete: number;
  /** Picks in use with a value among them: the n of an estimate that stops here. */
  readonly picksWithValue: number;
  /** Position of the first pick that still has to be visited; null where all are settled. */
  readonly nextPosition: number | null;
  /** Unit of that pick. */
  readonly nextUnit: number | null;
  /** Picks in use that still have to be visited. */
  readonly toVisit: number;
  /** Picks with a value behind the complete prefix: they can't enter an estimate that stops here. */
  readonly picksBeyond: number;
}

/**
 * Which prefix of the draw is complete now. When a season is cut short a full prefix of the draw order is still a
 * sample of the design; what happens to be counted is not, because crews go where it is near.
 * @param inUse one stratum's list after its acts
 * @param states by unit; a unit that is missing was not visited yet
 */
export function completePrefix(inUse: EntriesInUse, states: ReadonlyMap<number, VisitState>): CompletePrefix {
  const hasValue = (unit: number): boolean => {
    const state = states.get(unit);
    return state === "counted" || state === "not-in-population";
  };
  const waiting = inUse.inUse.filter((entry) => !hasValue(entry.unit));
  const [next] = waiting;
  const complete = next === undefined ? inUse.openedTo : next.position - 1;
  const withValue = inUse.inUse.filter((entry) => hasValue(entry.unit));
  const picksWithValue = withValue.filter((entry) => entry.position <= complete).length;
  return {
    complete,
    picksWithValue,
    nextPosition: next?.position ?? null,
    nextUnit: next?.unit ?? null,
    toVisit: waiting.length,
    picksBeyond: withValue.length - picksWithValue,
  };
}
