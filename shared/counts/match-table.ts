import { countWords, saySame, valueOf, type CellCount } from "./count.ts";
import { findFarAbove } from "./far-above.ts";
import { guessColumns, type ColumnChoice } from "./guess-columns.ts";
import {
  besideExisting,
  indexCells,
  readRows,
  type CellToCount,
  type ReadRow,
  type RowProblem,
  type SaidCount,
  type Verdict,
} from "./judge-rows.ts";
import type { CountRules } from "./read-count-text.ts";
import { plainWords } from "./read-state-text.ts";
import type { DateOrder } from "./read-date-text.ts";
import { judgeDates, type DatedRow, type DateOrderQuestion, type DateRules } from "./table-dates.ts";
import {
  judgeObservers,
  observerOf,
  type Observer,
  type ObserverAnswer,
  type ObserverQuestion,
  type ObserverSaid,
} from "./table-observers.ts";

export interface TableToMatch {
  readonly header: readonly string[];
  readonly rows: readonly (readonly string[])[];
  /** What a person chose; guessed where nobody did. */
  readonly columns?: ColumnChoice;
  readonly cells: readonly CellToCount[];
  /** Counts in force, by unit. */
  readonly existing: ReadonlyMap<number, CellCount>;
  readonly rules: CountRules;
  /** Names of what is counted, to know its column by. */
  readonly targetWords?: readonly string[];
  readonly dates: DateRules;
  /** Everybody of the survey. */
  readonly members: readonly Observer[];
  /** What a person has said of names in the file. */
  readonly observers: readonly ObserverAnswer[];
}

/** Asked once a word: whether it means searched, none found. */
interface ZeroWordQuestion {
  readonly kind: "zero-word";
  readonly word: string;
  readonly rows: number;
}

/** What is asked once a file, once a word or once a name. */
export type TableQuestion = ZeroWordQuestion | DateOrderQuestion | ObserverQuestion;

export interface RowVerdict extends Omit<ReadRow, "found" | "countText"> {
  readonly unit?: number;
  readonly orders?: readonly number[];
  /** The day of the count as it was read, on the clocks of the place; empty where the row tells none. */
  readonly day: string;
  /** Who counted: a member's name, or the name that stays in the note; empty where the row tells none. */
  readonly by: string;
  /** What to look at although the row is good; empty for most. */
  readonly flag: string;
}

/** What would be written for a cell, once, however often it was picked. */
export interface CountToWrite {
  readonly row: number;
  readonly unit: number;
  readonly label: string;
  readonly count: SaidCount;
  /** The row's note, with the name of an observer who is no member and with a date that could not be read. */
  readonly note: string;
  readonly observer: ObserverSaid;
  /** The moment of the count; null where the row tells none. */
  readonly madeAt: string | null;
}

export interface TableVerdict {
  readonly columns: ColumnChoice;
  readonly rows: readonly RowVerdict[];
  readonly toWrite: readonly CountToWrite[];
  /** Cells to visit without a count that the table doesn't name: not yet counted, never zero. */
  readonly notInTable: readonly CellToCount[];
  /** How many rows of each verdict, all verdicts named. */
  readonly numbers: Readonly<Record<Verdict, number>>;
  /** How many rows of each kind of question or refusal. */
  readonly kinds: readonly { readonly kind: RowProblem; readonly rows: number }[];
  readonly questions: readonly TableQuestion[];
  /** The order by which dates were read; null where none needed it. */
  readonly dateOrder: DateOrder | null;
  /** The answers that brought a name in the file to a member or to another spelling, among the rows to write. */
  readonly merged: readonly ObserverAnswer[];
  /** What is missing before anything can be matched, and how dates and names were read. */
  readonly notes: readonly string[];
}

const MOST_NAMED = 4;
const LONGEST_NOTE = 2000;

const list = (words: readonly (string | number)[]): string =>
  words.length < 2 ? words.join("") : `${words.slice(0, -1).join(", ")} and ${words.at(-1) ?? ""}`;

/** Several rows of one cell: equal ones count once, different ones wait for a person. Never averaged. */
function besideEachOther(rows: readonly ReadRow[]): ReadRow[] {
  const saying = rows.filter((row) => row.count !== undefined);
  const [first, ...others] = saying;
  if (first?.count === undefined || others.length === 0) return [...rows];
  const firstCount = first.count;
  const equal = others.every((row) => row.count !== undefined && saySame(row.count, firstCount));
  const orders = first.found?.orders ?? [];
  const later = new Set(others);
  if (equal) {
    const why =
      orders.length > 1
        ? `One count serves picks ${list(orders)}; row ${first.row} has it already.`
        : `The same as row ${first.row}: it enters once.`;
    return rows.map((row) => (later.has(row) ? { ...row, verdict: "same" as const, message: why } : row));
  }
  const numbers = saying
    .slice(0, MOST_NAMED)
    .map((row) => `${row.count === undefined ? "" : countWords(row.count)} in row ${row.row}`);
  const more = saying.length > MOST_NAMED ? [`${saying.length - MOST_NAMED} more`] : [];
  const twice = orders.length > 1 ? `One count serves picks ${list(orders)}. ` : "";
  const message = `The same cell with different numbers: ${list([...numbers, ...more])}. ${twice}Say which is the count and which is a recount.`;
  return rows.map((row) => (row.count !== undefined ? { ...row, verdict: "different" as const, message } : row));
}

function judgeTogether(rows: readonly ReadRow[], existing: ReadonlyMap<number, CellCount>): ReadRow[] {
  const byUnit = new Map<number, ReadRow[]>();
  for (const row of rows) {
    if (row.found === undefined) continue;
    const known = byUnit.get(row.found.unit) ?? [];
    known.push(besideExisting(row, existing.get(row.found.unit)));
    byUnit.set(row.found.unit, known);
  }
  const judged = new Map([...byUnit.values()].flatMap(besideEachOther).map((row) => [row.row, row]));
  return rows.map((row) => judged.get(row.row) ?? row);
}

/** The row whose count is far above all others, here and in the table, flagged; it stays good. */
function flagOf(rows: readonly ReadRow[], existing: ReadonlyMap<number, CellCount>): { row: number; flag: string } {
  const known = [...existing].flatMap(([unit, count]) => {
    const read = valueOf(count);
    return read.known ? [{ unit, value: read.value, row: 0 }] : [];
  });
  const fresh = rows.flatMap((row) =>
    row.verdict === "new" && row.count?.state === "counted" && row.found !== undefined
      ? [{ unit: row.found.unit, value: row.count.value, row: row.row }]
      : [],
  );
  const far = findFarAbove([...known, ...fresh]);
  if (far === "none" || far.cell.row === 0) return { row: 0, flag: "" };
  return {
    row: far.cell.row,
    flag: `Far above the next highest here, ${far.nextLargest}. Check the sheet; it stays as it is.`,
  };
}

function columnNotes({ unit, label, count, state }: ColumnChoice): string[] {
  const notes: string[] = [];
  if (unit < 0 && label < 0) notes.push("No column names the cells. Say which holds the unit number or the label.");
  if (count < 0 && state < 0) notes.push("No column holds counts. Say which one does.");
  return notes;
}

function shown({ found, countText: _, ...row }: ReadRow, told: Pick<RowVerdict, "day" | "by" | "flag">): RowVerdict {
  return { ...row, ...told, ...(found === undefined ? {} : { unit: found.unit, orders: found.orders }) };
}

function verdictNumbers(rows: readonly ReadRow[]): Record<Verdict, number> {
  const numbers = { new: 0, same: 0, different: 0, "not-drawn": 0, empty: 0, question: 0, refused: 0 };
  for (const row of rows) numbers[row.verdict] += 1;
  return numbers;
}

const nameOf = (observer: ObserverSaid): string => (observer.kind === "nobody" ? "" : observer.name);

function toWriteOf(row: ReadRow, observer: ObserverSaid, date: DatedRow | undefined): CountToWrite[] {
  const { verdict, found, count } = row;
  if (verdict !== "new" || found === undefined || count === undefined) return [];
  const by = observer.kind === "name" ? `counted by ${observer.name.trim()}` : "";
  const on = date === undefined || date.kept === "" ? "" : `on ${date.kept}`;
  const note = [row.note, by, on].filter((part) => part !== "").join("; ");
  return [
    {
      row: row.row,
      unit: found.unit,
      label: found.label,
      count,
      note: note.slice(0, LONGEST_NOTE),
      observer,
      madeAt: date?.madeAt ?? null,
    },
  ];
}

function zeroWordQuestions(rows: readonly ReadRow[]): ZeroWordQuestion[] {
  const words = new Map<string, number>();
  for (const { kind, countText } of rows) {
    const word = plainWords(countText);
    if (kind === "zero-word") words.set(word, (words.get(word) ?? 0) + 1);
  }
  return [...words].map(([word, number]) => ({ kind: "zero-word", word, rows: number }));
}

function mergedOf(rows: readonly ReadRow[], answers: readonly ObserverAnswer[]): ObserverAnswer[] {
  const written = new Set(rows.filter((row) => row.verdict === "new").map((row) => row.observer));
  return answers.filter(
    (answer) => written.has(answer.written) && ("member" in answer || answer.name !== answer.written),
  );
}

/**
 * Matches a table of counts to the drawn cells and says, row by row and before anything is written, what would happen.
 * Rows are matched by unit number first, then by label. What is written is one count a cell: new and clear. Cells that the
 * table doesn't name, or names without a count, are not yet counted; a count is never made up, averaged or dropped silently.
 */
export function matchTable(table: TableToMatch): TableVerdict {
  const { header, rows, cells, existing, rules } = table;
  const index = indexCells(cells);
  const known = { units: new Set(index.byUnit.keys()), labels: new Set(index.byLabel.keys()) };
  const columns = table.columns ?? guessColumns(header, rows, known, table.targetWords);
  const dated = judgeDates(judgeTogether(readRows(rows, columns, index, rules), existing), table.dates);
  const observed = judgeObservers(dated.rows, table.members, table.observers);
  const judged = observed.rows;
  const named = new Set(judged.flatMap((row) => (row.found === undefined ? [] : [row.found.unit])));
  const far = flagOf(judged, existing);
  const kinds = new Map<RowProblem, number>();
  for (const { kind } of judged) if (kind !== "") kinds.set(kind, (kinds.get(kind) ?? 0) + 1);
  return {
    columns,
    rows: judged.map((row) => {
      const flags = row.verdict === "new" ? [...(dated.flags.get(row.row) ?? [])] : [];
      if (row.row === far.row) flags.unshift(far.flag);
      const by = nameOf(observerOf(observed, row.row));
      return shown(row, { day: dated.dates.get(row.row)?.day ?? "", by, flag: flags.join(" ") });
    }),
    toWrite: judged.flatMap((row) => toWriteOf(row, observerOf(observed, row.row), dated.dates.get(row.row))),
    notInTable: cells.filter(({ unit }) => {
      const state = existing.get(unit)?.state ?? "not-visited";
      return state === "not-visited" && !named.has(unit);
    }),
    numbers: verdictNumbers(judged),
    kinds: [...kinds].map(([kind, number]) => ({ kind, rows: number })),
    questions: [
      ...zeroWordQuestions(judged),
      ...(dated.question === null ? [] : [dated.question]),
      ...observed.questions,
    ],
    dateOrder: dated.order,
    merged: mergedOf(judged, table.observers),
    notes: [...columnNotes(columns), ...dated.notes, ...observed.notes],
  };
}
