/**
 * What came back from a cell that was to be visited. "Not visited yet" is none of these: it is the absence of an entry.
 * - counted: its number, zero included.
 * - not-in-population: enters the estimate as 0; its number is told.
 * - refused, unsafe, not-reached, lost: no value; the cell is closed and a reserve opens for each of its picks.
 */
export const VISIT_STATES = ["counted", "not-in-population", "refused", "unsafe", "not-reached", "lost"] as const;
export type VisitState = (typeof VISIT_STATES)[number];

export const CLOSING_STATES = ["refused", "unsafe", "not-reached", "lost"] as const satisfies readonly VisitState[];
export type ClosingState = (typeof CLOSING_STATES)[number];

/** Whether a state closes the cell's picks, so that reserves open. */
export function isClosing(state: VisitState): state is ClosingState {
  switch (state) {
    case "counted":
    case "not-in-population":
      return false;
    case "refused":
    case "unsafe":
    case "not-reached":
    case "lost":
      return true;
  }
}
