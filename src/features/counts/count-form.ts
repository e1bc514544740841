import { readCountText } from "#shared/counts/read-count-text.ts";
import type { Said } from "./queries.ts";

export const REASONS = ["not-in-population", "refused", "unsafe", "not-reached", "lost"] as const;
export type Reason = (typeof REASONS)[number];

/** What the form holds: a text for the number, or a reason; never both. */
export interface CountTexts {
  readonly number: string;
  readonly reason: Reason | null;
  readonly note: string;
}

export const EMPTY_TEXTS: CountTexts = { number: "", reason: null, note: "" };

/** What would be saved, what is asked first, or why nothing can be. An empty field is not a zero. */
export type CountFormReading =
  | { readonly kind: "ready"; readonly said: Said }
  | { readonly kind: "empty" }
  | { readonly kind: "asked"; readonly why: string; readonly ifYes: Said }
  | { readonly kind: "wrong"; readonly why: string };

export function readCountForm(
  { number, reason }: CountTexts,
  { wholeNumbers, plural }: { readonly wholeNumbers: boolean; readonly plural: string },
): CountFormReading {
  if (reason !== null) return { kind: "ready", said: { state: reason } };
  if (number.trim() === "") return { kind: "empty" };
  const reading = readCountText(number, { wholeNumbers });
  switch (reading.kind) {
    case "value":
      return { kind: "ready", said: { state: "counted", value: reading.value } };
    case "state":
      return reading.state === "not-visited" ? { kind: "empty" } : { kind: "ready", said: { state: reading.state } };
    case "empty":
      return { kind: "empty" };
    case "question":
      if (reading.ask === "fraction") {
        return { kind: "wrong", why: `${reading.ifYes} is no whole number, and ${plural} are counted whole.` };
      }
      return { kind: "asked", why: reading.message, ifYes: { state: "counted", value: reading.ifYes } };
    case "refused":
      return { kind: "wrong", why: reading.message };
  }
}
