import type { ReactNode } from "react";

/** One column of a DataTable, described in plain data. */
export interface DataColumn<Row> {
  readonly id: string;
  readonly head: ReactNode;
  /** Right-aligned, never broken. */
  readonly numeric?: boolean;
  /** What the column sorts by; null and undefined (missing) come last whichever way. Without it the column does not sort. */
  readonly sortBy?: (row: Row) => string | number | null | undefined;
  readonly cell: (row: Row) => ReactNode;
}

/** The look of a row: chosen and strong are quiet, attention ochre, refused brick-red; each goes with a word in the row. */
export type RowTone = "attention" | "refused" | "strong";
