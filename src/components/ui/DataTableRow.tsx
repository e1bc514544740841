import type { KeyboardEvent, Ref } from "react";
import type { DataColumn, RowTone } from "./data-column.ts";

interface DataTableRowProps<Row> {
  readonly row: Row;
  readonly id: string;
  /** Place among the rows, from 0. */
  readonly index: number;
  /** Place among the lines of the table (rows and what is open below them), for measuring. */
  readonly line: number;
  readonly columns: readonly DataColumn<Row>[];
  readonly tone: RowTone | undefined;
  /** null where rows are not chosen in this table. */
  readonly choice: {
    readonly chosen: boolean;
    readonly focusable: boolean;
    readonly choose: () => void;
    readonly move: (event: KeyboardEvent<HTMLTableRowElement>) => boolean;
  } | null;
  readonly numbered: boolean;
  readonly ref?: Ref<HTMLTableRowElement> | undefined;
}

/** One row of a DataTable; where rows are chosen, by click, or by arrows and Enter or the space bar. */
export function DataTableRow<Row>({
  row,
  id,
  index,
  line,
  columns,
  tone,
  choice,
  numbered,
  ref,
}: DataTableRowProps<Row>) {
  return (
    <tr
      ref={ref}
      data-row-id={id}
      data-index={line}
      data-row={index}
      data-tone={tone}
      data-pickable={choice === null ? undefined : ""}
      aria-rowindex={numbered ? index + 2 : undefined}
      aria-selected={choice?.chosen}
      tabIndex={choice === null ? undefined : choice.focusable ? 0 : -1}
      onClick={choice?.choose}
      onKeyDown={(event) => {
        if (choice === null || event.target !== event.currentTarget) return;
        if (event.key === "Enter" || event.key === " ") choice.choose();
        else if (!choice.move(event)) return;
        event.preventDefault();
      }}
    >
      {columns.map((column) => (
        <td key={column.id} className={column.numeric === true ? "q-num" : undefined}>
          {column.cell(row)}
        </td>
      ))}
    </tr>
  );
}
