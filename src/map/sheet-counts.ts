import type { Visit } from "#shared/api/field.ts";
import { STATE_WORDS } from "#shared/counts/count.ts";
import type { SheetCount } from "./CountsLayer.tsx";

/** A cell to visit as the sheet shows it; a missing count is a word, never a number. */
export function sheetCount({ id, column, row, label, count }: Visit): SheetCount {
  const cell = { key: id, column, row, label };
  if (count.state === "counted") return { ...cell, state: "counted", value: count.value };
  if (count.state === "not-visited") return { ...cell, state: "not-visited" };
  return { ...cell, state: "not-counted", word: STATE_WORDS[count.state] };
}
