import { countWords, saySame, type CellCount } from "./count.ts";
import type { ColumnChoice } from "./guess-columns.ts";
import { mangledAs } from "./mangled-label.ts";
import { readCountText, type CountRules, type QuestionKind, type RefusedKind } from "./read-count-text.ts";
import { readStateText } from "./read-state-text.ts";
import { westernDigits } from "./digits.ts";

/** One cell to visit, however often it was picked. */
export interface CellToCount {
  readonly unit: number;
  readonly label: string;
  readonly orders: readonly number[];
  /** When the cell was first to be visited: drawn, or opened as a reserve. */
  readonly openedAt?: string;
}

export type Verdict = "new" | "same" | "different" | "not-drawn" | "empty" | "question" | "refused";

/** What can be wrong with a row beside its count. */
export type RowProblem =
  | RefusedKind
  | QuestionKind
  | "no-cell"
  | "label-mangled"
  | "unit-unreadable"
  | "unit-label"
  | "state"
  | "date-order"
  | "date-impossible"
  | "date-future"
  | "observer";

/** What somebody says of a cell: anything but that nobody was there. */
export type SaidCount = Exclude<CellCount, { state: "not-visited" }>;

/** A row of the table, read by itself. */
export interface ReadRow {
  /** The first data row is 1. */
  readonly row: number;
  readonly verdict: Verdict;
  /** Kind of a question or refusal, for a table of kinds; empty for the others. */
  readonly kind: RowProblem | "";
  readonly message: string;
  /** The cell's label, or what the row calls it. */
  readonly cell: string;
  /** What the row says, as written: its count and its state. */
  readonly said: string;
  /** The count alone, as written. */
  readonly countText: string;
  readonly found?: CellToCount;
  readonly count?: SaidCount;
  readonly note: string;
  /** As written, outer spaces and all: they may be what parts one spelling from another. */
  readonly observer: string;
  readonly date: string;
}

type Judgement = Pick<ReadRow, "verdict" | "kind" | "message"> & { readonly count?: SaidCount };

export interface CellIndex {
  readonly byUnit: ReadonlyMap<number, CellToCount>;
  /** By label in capitals. */
  readonly byLabel: ReadonlyMap<string, CellToCount>;
}

export function indexCells(cells: readonly CellToCount[]): CellIndex {
  return {
    byUnit: new Map(cells.map((cell) => [cell.unit, cell])),
    byLabel: new Map(cells.map((cell) => [cell.label.toUpperCase(), cell])),
  };
}

const refusal = (kind: RowProblem, message: string): Judgement => ({ verdict: "refused", kind, message });
const good = (count: SaidCount): Judgement => ({
  verdict: "new",
  kind: "",
  message: `Would be written: ${countWords(count)}.`,
  count,
});

const NOT_DRAWN: Judgement = {
  verdict: "not-drawn",
  kind: "",
  message: "Counted but not drawn: kept aside, not used.",
};

/** The drawn cell that a row names: by unit number first, by label where there is none; a judgement where it names none. */
function findCell(unitText: string, label: string, index: CellIndex): CellToCount | Judgement {
  const unit = westernDigits(unitText).replaceAll(/[\s\u00a0\u202f]/g, "");
  const mangled = mangledAs(label);
  if (unit === "" && label === "") return refusal("no-cell", "The row names no cell. Add its unit number.");
  if (unit !== "") {
    if (!/^\d+(?:[.,]0+)?$/.test(unit)) {
      return refusal("unit-unreadable", `“${unitText}” is no unit number. Take it from the list of cells to visit.`);
    }
    const found = index.byUnit.get(Number.parseInt(unit, 10));
    if (found === undefined) return NOT_DRAWN;
    if (label !== "" && mangled === "no" && found.label.toUpperCase() !== label.toUpperCase()) {
      const message = `Unit ${found.unit} is cell ${found.label}, and the row says ${label}. Correct one of them.`;
      return refusal("unit-label", message);
    }
    return found;
  }
  const found = index.byLabel.get(label.toUpperCase());
  if (found !== undefined) return found;
  if (mangled === "no") return NOT_DRAWN;
  const message = `The label “${label}” looks like ${mangled} made by a spreadsheet. Use the unit column.`;
  return refusal("label-mangled", message);
}

function judgeCountText(said: string, rules: CountRules): Judgement {
  const reading = readCountText(said, rules);
  switch (reading.kind) {
    case "value":
      return good({ state: "counted", value: reading.value });
    case "state":
      return reading.state === "not-visited"
        ? { verdict: "empty", kind: "", message: "Not yet counted; this is no zero." }
        : good({ state: reading.state });
    case "empty":
      return { verdict: "empty", kind: "", message: "No count in this row: not yet counted, and no zero." };
    case "question":
      return { verdict: "question", kind: reading.ask, message: reading.message };
    case "refused":
      return refusal(reading.why, reading.message);
  }
}

/** What count and state say together; where they contradict each other it is asked, never guessed. */
function judgeSaid(said: string, stateText: string, note: string, rules: CountRules): Judgement {
  const byCount = judgeCountText(said, rules);
  if (stateText === "") return byCount;
  const state = readStateText(stateText);
  if (state === "unknown") {
    return refusal(
      "state",
      `“${stateText}” is no state. Write counted, not in the population, refused, unsafe, not reached or lost.`,
    );
  }
  if (state === "counted") {
    if (byCount.verdict !== "empty") return byCount;
    if (stateText.trim().toLowerCase() === "zero") return good({ state: "counted", value: 0 });
    return { verdict: "question", kind: "state", message: "The state says counted, and there is no number. Enter it." };
  }
  if (byCount.count?.state === state) return byCount;
  if (byCount.verdict !== "empty") {
    const message = `The state says ${stateText}, and the row has “${said}” as its count. Leave one of them.`;
    return { verdict: "question", kind: "state", message };
  }
  if (state === "not-visited") return byCount;
  return good(note === "" ? { state } : { state, reason: note });
}

/**
 * Reads each row by itself: which drawn cell it names and what it says of it. What other rows or earlier counts say comes
 * after (match-table.ts).
 */
export function readRows(
  rows: readonly (readonly string[])[],
  columns: ColumnChoice,
  index: CellIndex,
  rules: CountRules,
): ReadRow[] {
  return rows.map((cells, i) => {
    const written = (column: number): string => (column < 0 ? "" : (cells[column] ?? ""));
    const text = (column: number): string => written(column).trim();
    const [unitText, label, said, stateText] = [
      text(columns.unit),
      text(columns.label),
      text(columns.count),
      text(columns.state),
    ];
    const note = text(columns.note);
    const found = findCell(unitText, label, index);
    const named = "orders" in found;
    const judgement = named ? judgeSaid(said, stateText, note, rules) : found;
    const observer = text(columns.observer) === "" ? "" : written(columns.observer);
    const extra = { note, observer, date: text(columns.date) };
    const words = [said, stateText].filter((part) => part !== "").join(", ");
    const cell = named ? found.label : label === "" ? unitText : label;
    return { row: i + 1, ...judgement, cell, said: words, countText: said, ...(named ? { found } : {}), ...extra };
  });
}

/** A read row beside what is known already: new, the same, or different. */
export function besideExisting(row: ReadRow, existing: CellCount | undefined): ReadRow {
  if (row.verdict !== "new" || row.count === undefined) return row;
  if (existing === undefined || existing.state === "not-visited") return row;
  if (saySame(row.count, existing)) return { ...row, verdict: "same", message: "Already here; nothing new." };
  const message = `Here: ${countWords(existing)}; in the file: ${countWords(row.count)}. Is it a recount or a correction? Amend the cell by hand.`;
  return { ...row, verdict: "different", message };
}
