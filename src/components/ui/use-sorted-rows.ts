import {
  createSortedRowModel,
  rowSortingFeature,
  tableFeatures,
  useTable,
  type SortingState,
} from "@tanstack/react-table";
import { useMemo, useState } from "react";
import type { DataColumn } from "./data-column.ts";
import type { SortDirection } from "./SortableHead.tsx";

const features = tableFeatures({ rowSortingFeature, sortedRowModel: createSortedRowModel() });
const collator = new Intl.Collator("en", { numeric: true });

export interface SortState {
  readonly column: string;
  readonly direction: SortDirection;
}

/** Rows in the order of the chosen column (stable; missing values last), the order given until one is chosen, and how to choose. */
export function useSortedRows<Row extends object>(
  rows: readonly Row[],
  columns: readonly DataColumn<Row>[],
  initial: SortState | undefined,
) {
  const [sorting, setSorting] = useState<SortingState>(
    initial === undefined ? [] : [{ id: initial.column, desc: initial.direction === "descending" }],
  );
  const definitions = useMemo(
    () =>
      columns.map((column) => ({
        id: column.id,
        accessorFn: (row: Row) => column.sortBy?.(row) ?? undefined,
        enableSorting: column.sortBy !== undefined,
        sortUndefined: "last" as const,
        sortDescFirst: false,
        sortFn: (a: { getValue: (id: string) => unknown }, b: { getValue: (id: string) => unknown }, id: string) =>
          compare(a.getValue(id), b.getValue(id)),
      })),
    [columns],
  );
  const data = useMemo(() => [...rows], [rows]);
  const table = useTable({ features, columns: definitions, data, state: { sorting }, onSortingChange: setSorting });
  const sorted = (id: string): SortDirection | false => {
    const entry = sorting.find((one) => one.id === id);
    return entry === undefined ? false : entry.desc ? "descending" : "ascending";
  };
  /** Ascending first, then descending, then back to ascending. */
  const sortBy = (id: string) => setSorting([{ id, desc: sorted(id) === "ascending" }]);
  return { rows: table.getRowModel().rows.map((row) => row.original), sorted, sortBy };
}

function compare(a: unknown, b: unknown): number {
  if (typeof a === "number" && typeof b === "number") return a - b;
  return collator.compare(String(a), String(b));
}
