import { createHash } from "node:crypto";
import type { CellCount } from "#shared/counts/count.ts";
import { type ColumnChoice, guessColumns } from "#shared/counts/guess-columns.ts";
import type { CellToCount, Verdict } from "#shared/counts/judge-rows.ts";
import { matchTable, type RowVerdict, type TableToMatch, type TableVerdict } from "#shared/counts/match-table.ts";
import { readCsv } from "#shared/exchange/csv.ts";

/** A table of counts and all that it is held against. */
export interface CountsTask extends Pick<TableToMatch, "rules" | "dates" | "members" | "observers"> {
  readonly bytes: Uint8Array;
  /** Columns that a person chose; the rest is guessed. */
  readonly columns: Partial<ColumnChoice>;
  readonly cells: readonly CellToCount[];
  /** Counts in force, by unit. */
  readonly existing: ReadonlyMap<number, CellCount>;
  readonly targetWords: readonly string[];
}

export interface JudgedCounts extends Omit<TableVerdict, "kinds" | "notInTable"> {
  readonly fileSha256: string;
  readonly header: readonly string[];
  readonly firstRows: readonly (readonly string[])[];
  /** Labels. */
  readonly notInTable: readonly string[];
}

/** More rows than that are counted, not listed: those that matter least are left out. */
const MOST_ROWS_LISTED = 5000;
const FIRST_ROWS = 3;
const BY_WEIGHT: readonly Verdict[] = ["question", "refused", "different", "new", "same", "empty", "not-drawn"];

/** Bytes of a table → what each row says, what is asked, and what would be written. */
export function judgeCountsTask({ bytes, columns, ...task }: CountsTask): JudgedCounts {
  const { value: table, notes } = readCsv(bytes);
  const { header, rows } = table;
  const known = {
    units: new Set(task.cells.map(({ unit }) => unit)),
    labels: new Set(task.cells.map(({ label }) => label.toUpperCase())),
  };
  const chosen = { ...guessColumns(header, rows, known, task.targetWords), ...columns };
  const { kinds: _, ...verdict } = matchTable({ ...task, header, rows, columns: chosen });
  return {
    ...verdict,
    fileSha256: createHash("sha256").update(bytes).digest("hex"),
    header,
    firstRows: rows.slice(0, FIRST_ROWS),
    notes: [...notes, ...verdict.notes],
    rows: listed(verdict.rows),
    notInTable: verdict.notInTable.map(({ label }) => label),
  };
}

/** As many rows as are listed, in the order of the table: first those that a person must look at. */
function listed(rows: readonly RowVerdict[]): RowVerdict[] {
  if (rows.length <= MOST_ROWS_LISTED) return [...rows];
  const byWeight = BY_WEIGHT.flatMap((verdict) => rows.filter((row) => row.verdict === verdict));
  return byWeight.slice(0, MOST_ROWS_LISTED).toSorted((a, b) => a.row - b.row);
}
