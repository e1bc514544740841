import type { CurrentCount, Visit } from "#shared/api/field.ts";
import type { VisitMarkState } from "../components/ui/visit-states.ts";

/** The mark of a count: zero is told apart from the other counts. */
export function markOf(count: CurrentCount): VisitMarkState {
  if (count.state !== "counted") return count.state;
  return count.value === 0 ? "zero" : "counted";
}

/** Somebody was there: a count, or a word why there is none. */
export function isSettled(visit: Visit): boolean {
  return visit.state === "closed" || visit.count.state !== "not-visited";
}

/** "pick 9 and 10": every place of the cell in the draw. */
export function ordersText(orders: readonly number[]): string {
  return orders.join(", ");
}
