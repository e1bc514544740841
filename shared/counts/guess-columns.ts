import { readCountText } from "./read-count-text.ts";
import { plainWords, readStateText } from "./read-state-text.ts";

const TABLE_COLUMNS = ["unit", "label", "count", "state", "note", "observer", "date"] as const;
type TableColumn = (typeof TABLE_COLUMNS)[number];

/** Which column of a table holds what, from 0; −1 where none does. `note` holds reasons and remarks. */
export type ColumnChoice = Readonly<Record<TableColumn, number>>;

export const NO_COLUMNS: ColumnChoice = { unit: -1, label: -1, count: -1, state: -1, note: -1, observer: -1, date: -1 };

/** What a column is called in the trade, best name first. */
const NAMES: Readonly<Record<TableColumn, readonly string[]>> = {
  unit: ["unit", "unit number", "unit no", "cell number", "cell no", "unit id"],
  label: [
    "label",
    "cell",
    "cell label",
    "plot",
    "quadrat",
    "cell name",
    "plot name",
    "waypoint",
    "name",
    "square",
    "site",
    "id",
  ],
  count: [
    "count",
    "number",
    "total",
    "counted",
    "found",
    "n",
    "number found",
    "number seen",
    "value",
    "individuals",
    "abundance",
  ],
  state: ["state", "status", "visit state", "outcome", "result"],
  note: ["reason", "note", "notes", "remark", "remarks", "comment", "comments"],
  observer: ["observer", "counted by", "counter", "who", "initials", "recorder", "observers", "name of observer"],
  date: [
    "date",
    "date and time",
    "counted on",
    "counted at",
    "date counted",
    "survey date",
    "visit date",
    "made at",
    "day",
    "timestamp",
  ],
};

/** Columns that look like units or counts but are places in the draw. */
const NEVER = new Set([
  "pick",
  "picks",
  "order",
  "draw order",
  "draw orders",
  "orders",
  "repeats",
  "times",
  "stratum",
  "row",
  "column",
]);

export interface KnownCells {
  readonly units: ReadonlySet<number>;
  /** In capitals. */
  readonly labels: ReadonlySet<string>;
}

const LOOK_AT = 200;

const column = (rows: readonly (readonly string[])[], index: number): string[] =>
  rows
    .slice(0, LOOK_AT)
    .map((row) => (row[index] ?? "").trim())
    .filter((cell) => cell !== "");

const share = (cells: readonly string[], test: (cell: string) => boolean): number =>
  cells.length === 0 ? 0 : cells.filter(test).length / cells.length;

/** The free column with the best name, if any; the target's own name is a good one for the count. */
function byName(header: readonly string[], names: readonly string[], taken: ReadonlySet<number>): number {
  for (const name of names) {
    const index = header.findIndex((title, i) => !taken.has(i) && plainWords(title) === name);
    if (index !== -1) return index;
  }
  return -1;
}

/** The free column in which most cells pass the test, at least half of them. */
function byContents(
  header: readonly string[],
  rows: readonly (readonly string[])[],
  taken: ReadonlySet<number>,
  test: (cell: string) => boolean,
): number {
  let best = { index: -1, share: 0.5 };
  header.forEach((_, index) => {
    if (taken.has(index)) return;
    const found = share(column(rows, index), test);
    if (found > best.share) best = { index, share: found };
  });
  return best.index;
}

const isNumber = (cell: string): boolean => readCountText(cell).kind === "value";

/** A label column that holds unit numbers is the unit column, and the other way round. */
function swapByContents(
  choice: Record<TableColumn, number>,
  rows: readonly (readonly string[])[],
  known: KnownCells,
): void {
  const looksLike = (index: number, test: (cell: string) => boolean) => share(column(rows, index), test) >= 0.5;
  const isUnit = (cell: string) => /^\d+$/.test(cell) && known.units.has(Number(cell));
  const isLabel = (cell: string) => known.labels.has(cell.toUpperCase());
  if (
    choice.unit === -1 &&
    choice.label !== -1 &&
    looksLike(choice.label, isUnit) &&
    !looksLike(choice.label, isLabel)
  ) {
    choice.unit = choice.label;
    choice.label = -1;
  } else if (choice.label === -1 && choice.unit !== -1 && looksLike(choice.unit, isLabel)) {
    choice.label = choice.unit;
    choice.unit = -1;
  }
}

/**
 * Which column holds what: by its name first, then, for cell and count, by what stands in it. A guess; a person confirms it.
 * @param targetWords names of what is counted, such as "marsh-orchid spikes" or "spikes"
 */
export function guessColumns(
  header: readonly string[],
  rows: readonly (readonly string[])[],
  known: KnownCells,
  targetWords: readonly string[] = [],
): ColumnChoice {
  const taken = new Set(header.flatMap((title, i) => (NEVER.has(plainWords(title)) ? [i] : [])));
  const choice: Record<TableColumn, number> = { ...NO_COLUMNS };
  const take = (name: TableColumn, index: number) => {
    choice[name] = index;
    if (index !== -1) taken.add(index);
  };
  for (const name of TABLE_COLUMNS) {
    const words = name === "count" ? [...NAMES.count, ...targetWords.map(plainWords)] : NAMES[name];
    take(name, byName(header, words, taken));
  }
  if (choice.label === -1 && choice.unit === -1) {
    take(
      "label",
      byContents(header, rows, taken, (cell) => known.labels.has(cell.toUpperCase())),
    );
  }
  if (choice.label === -1 && choice.unit === -1) {
    take(
      "unit",
      byContents(header, rows, taken, (cell) => /^\d+$/.test(cell) && known.units.has(Number(cell))),
    );
  }
  if (choice.count === -1) take("count", byContents(header, rows, taken, isNumber));
  if (choice.state === -1)
    take(
      "state",
      byContents(header, rows, taken, (cell) => readStateText(cell) !== "unknown"),
    );
  swapByContents(choice, rows, known);
  return choice;
}
