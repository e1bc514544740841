import { VISIT_STATES, isClosing, type ClosingState, type VisitState } from "#shared/field/states.ts";

/**
 * What is known of one target at one cell. States are kept apart, and only `counted` has a number:
 * - counted: its number, zero included (searched, none found).
 * - not-in-population: there was nothing to count in the sense of the survey; enters an estimate as 0, and is told.
 * - refused, unsafe, not-reached, lost: no value. Missing is never zero.
 * - not-visited: nobody has said anything yet.
 */
export type CellCount =
  | { readonly state: "counted"; readonly value: number }
  | { readonly state: Exclude<VisitState, "counted">; readonly reason?: string }
  | { readonly state: "not-visited" };

export const COUNT_STATES = [...VISIT_STATES, "not-visited"] as const;
export type CountState = (typeof COUNT_STATES)[number];

export const NOT_VISITED: CellCount = { state: "not-visited" };

/** Numbers above this are a slip of the keyboard. */
export const MOST_COUNTED = 1e12;

/** The words for the states: on screen, on sheets and in exports. */
export const STATE_WORDS = {
  counted: "counted",
  "not-in-population": "not in the population",
  refused: "refused",
  unsafe: "unsafe",
  "not-reached": "not reached",
  lost: "lost",
  "not-visited": "not visited yet",
} as const satisfies Record<CountState, string>;

/** What a person should understand by a state, in one line. */
export const STATE_MEANINGS = {
  counted: "Searched and counted. Zero is a count.",
  "not-in-population":
    "Visited; nothing there belongs to what the survey counts. Enters the estimate as 0, and its number is told.",
  refused: "The owner or occupier said no. The pick is closed and the next reserve opens.",
  unsafe: "It could not be counted without danger. The pick is closed and the next reserve opens.",
  "not-reached": "The crew did not get there and will not. The pick is closed and the next reserve opens.",
  lost: "It was counted, but the number is gone. The pick is closed and the next reserve opens.",
  "not-visited": "Nobody has been there yet. It has no number and opens no reserve.",
} as const satisfies Record<CountState, string>;

/** Whether a state closes the cell's picks. */
export function closes(state: CountState): state is ClosingState {
  return state !== "not-visited" && isClosing(state);
}

/**
 * The number with which a cell enters an estimate, told apart from having none: its count, or 0 where it is not in the
 * population.
 */
export function valueOf(
  count: CellCount,
): { readonly known: true; readonly value: number } | { readonly known: false } {
  switch (count.state) {
    case "counted":
      return { known: true, value: count.value };
    case "not-in-population":
      return { known: true, value: 0 };
    case "refused":
    case "unsafe":
    case "not-reached":
    case "lost":
    case "not-visited":
      return { known: false };
  }
}

/** Whether two say the same; reasons don't matter. */
export function saySame(a: CellCount, b: CellCount): boolean {
  if (a.state === "counted" && b.state === "counted") return a.value === b.value;
  return a.state === b.state;
}

/** "12", "zero", "refused": a count in words for a table or a sentence. */
export function countWords(count: CellCount): string {
  if (count.state !== "counted") return STATE_WORDS[count.state];
  return count.value === 0 ? "zero" : String(count.value);
}

/**
 * The count, if it can be one: a finite number from 0 to 10¹².
 * @throws RangeError with the value otherwise.
 */
export function checkValue(value: number): number {
  if (!(value >= 0 && value <= MOST_COUNTED)) throw new RangeError(`a count is a number from 0 to 1e12, got ${value}`);
  return value;
}
