import type { CurrentCount, Visit } from "#shared/api/field.ts";
import { isClosing } from "#shared/field/states.ts";
import type { VisitMarkState } from "../components/ui/visit-states.ts";

/** The mark of a count: zero is told apart from the other counts. */
export function markOf(count: CurrentCount): VisitMarkState {
  if (count.state !== "counted") return count.state;
  return count.value === 0 ? "zero" : "counted";
}

/** Somebody was there, or nobody has to go: a count, a word why there is none, or closed. */
export function isVisited(visit: Visit): boolean {
  return visit.state === "closed" || visit.count.state !== "not-visited";
}

/** Reported as not countable, but not closed: no reserve has been opened for it. */
export function waitsForLead({ state, count }: Visit): boolean {
  return state === "in-use" && count.state !== "not-visited" && isClosing(count.state);
}

/** Nothing is left to do: counted, not in the population, or closed. */
export function isSettled(visit: Visit): boolean {
  return isVisited(visit) && !waitsForLead(visit);
}

/** Those who hold cells, each once, in draw order of their first. */
export function peopleWithCells(visits: readonly Visit[]): { readonly id: string; readonly name: string }[] {
  const people = new Map<string, string>();
  for (const { assignedTo } of visits) if (assignedTo !== null) people.set(assignedTo.memberId, assignedTo.name);
  return [...people].map(([id, name]) => ({ id, name }));
}

/** "9, 10": every place of the cell in the draw. */
export function ordersText(orders: readonly number[]): string {
  return orders.join(", ");
}
