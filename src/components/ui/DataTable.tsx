import { useVirtualizer } from "@tanstack/react-virtual";
import { useRef, type KeyboardEvent, type ReactNode } from "react";
import { classes } from "./classes.ts";
import type { DataColumn, RowTone } from "./data-column.ts";
import { SortableHead } from "./SortableHead.tsx";
import { useSortedRows, type SortState } from "./use-sorted-rows.ts";

interface DataTableProps<Row extends object> {
  /** What the table holds, for screen readers. */
  readonly caption: string;
  readonly columns: readonly DataColumn<Row>[];
  readonly rows: readonly Row[];
  readonly rowId: (row: Row) => string;
  readonly chosen?: string | null;
  /** With it rows are pressed, or reached by arrows and chosen by Enter. */
  readonly onChoose?: (id: string, row: Row) => void;
  readonly tone?: (row: Row) => RowTone | undefined;
  /** What opens below a row: a form, a report. */
  readonly detail?: (row: Row) => ReactNode;
  readonly initialSort?: SortState;
  readonly empty?: ReactNode;
  /** Above 200 rows the table scrolls in a frame of this height in px and holds only the rows in sight. */
  readonly maxHeight?: number;
  readonly dense?: boolean;
}

const VIRTUAL_ABOVE = 200;

type Line<Row> = { readonly key: string; readonly row: Row; readonly index: number; readonly detail: ReactNode };

/** Moves the focus to the next or previous row, first or last; true where the key was one of those. */
function moveFocus(
  event: KeyboardEvent<HTMLTableRowElement>,
  index: number,
  count: number,
  show: (index: number) => void,
): boolean {
  const goals: Readonly<Record<string, number>> = { ArrowDown: index + 1, ArrowUp: index - 1, Home: 0, End: count - 1 };
  const goal = goals[event.key];
  if (goal === undefined) return false;
  const target = Math.min(count - 1, Math.max(0, goal));
  const table = event.currentTarget.closest("table");
  show(target);
  requestAnimationFrame(() => table?.querySelector<HTMLTableRowElement>(`tr[data-row="${target}"]`)?.focus());
  return true;
}

/** A sortable table over any number of rows. Lists above 200 rows keep only the rows in sight in the page. */
export function DataTable<Row extends object>(props: DataTableProps<Row>) {
  const {
    caption,
    columns,
    rowId,
    chosen = null,
    onChoose,
    tone,
    detail,
    initialSort,
    empty,
    maxHeight = 560,
    dense = false,
  } = props;
  const { rows, sorted, sortBy } = useSortedRows(props.rows, columns, initialSort);
  const frame = useRef<HTMLDivElement>(null);
  const lines: Line<Row>[] = rows.flatMap((row, index) => {
    const below = detail?.(row);
    const line = { key: rowId(row), row, index, detail: undefined };
    return below === undefined || below === null || below === false
      ? [line]
      : [line, { ...line, key: `${line.key}/detail`, detail: below }];
  });
  const virtual = lines.length > VIRTUAL_ABOVE;
  const virtualizer = useVirtualizer({
    count: lines.length,
    getScrollElement: () => frame.current,
    estimateSize: () => 33,
    overscan: 12,
    enabled: virtual,
    getItemKey: (index) => lines[index]?.key ?? index,
  });
  const items = virtual ? virtualizer.getVirtualItems() : lines.map((_, index) => ({ index }));
  const before = virtual ? (virtualizer.getVirtualItems()[0]?.start ?? 0) : 0;
  const after = virtual ? virtualizer.getTotalSize() - (virtualizer.getVirtualItems().at(-1)?.end ?? 0) : 0;
  const focusable = Math.max(
    0,
    rows.findIndex((row) => rowId(row) === chosen),
  );
  const show = (row: number) => {
    if (virtual) virtualizer.scrollToIndex(lines.findIndex((line) => line.index === row));
  };
  return (
    <div
      ref={frame}
      className="q-table-scroll q-table-sticky"
      style={virtual ? { maxHeight } : undefined}
      tabIndex={virtual && onChoose === undefined ? 0 : undefined}
      role="group"
      aria-label={virtual ? caption : undefined}
    >
      <table
        className={classes("q-table", dense && "q-table-dense")}
        role={onChoose === undefined ? undefined : "grid"}
        aria-rowcount={virtual ? rows.length + 1 : undefined}
      >
        <caption className="sr-only">{caption}</caption>
        <thead className="q-data-head">
          <tr>
            {columns.map((column) =>
              column.sortBy === undefined ? (
                <th key={column.id} scope="col" className={column.numeric === true ? "q-num" : undefined}>
                  {column.head}
                </th>
              ) : (
                <SortableHead
                  key={column.id}
                  sorted={sorted(column.id)}
                  onSort={() => sortBy(column.id)}
                  numeric={column.numeric === true}
                >
                  {column.head}
                </SortableHead>
              ),
            )}
          </tr>
        </thead>
        <tbody>
          {before > 0 && <Gap height={before} columns={columns.length} />}
          {items.map(({ index }) => {
            const line = lines[index];
            if (line === undefined) return null;
            return line.detail === undefined ? (
              <tr
                key={line.key}
                ref={virtual ? virtualizer.measureElement : undefined}
                data-index={index}
                data-row={line.index}
                data-tone={tone?.(line.row)}
                data-pickable={onChoose === undefined ? undefined : ""}
                aria-rowindex={virtual ? line.index + 2 : undefined}
                aria-selected={onChoose === undefined ? undefined : line.key === chosen}
                tabIndex={onChoose === undefined ? undefined : line.index === focusable ? 0 : -1}
                onClick={() => onChoose?.(line.key, line.row)}
                onKeyDown={(event) => {
                  if (onChoose === undefined || event.target !== event.currentTarget) return;
                  if (event.key === "Enter" || event.key === " ") onChoose(line.key, line.row);
                  else if (!moveFocus(event, line.index, rows.length, show)) return;
                  event.preventDefault();
                }}
              >
                {columns.map((column) => (
                  <td key={column.id} className={column.numeric === true ? "q-num" : undefined}>
                    {column.cell(line.row)}
                  </td>
                ))}
              </tr>
            ) : (
              <tr key={line.key} ref={virtual ? virtualizer.measureElement : undefined} data-index={index}>
                <td colSpan={columns.length}>{line.detail}</td>
              </tr>
            );
          })}
          {after > 0 && <Gap height={after} columns={columns.length} />}
          {rows.length === 0 && empty !== undefined && (
            <tr>
              <td colSpan={columns.length}>{empty}</td>
            </tr>
          )}
        </tbody>
      </table>
    </div>
  );
}

/** The room of the rows out of sight. */
function Gap({ height, columns }: { readonly height: number; readonly columns: number }) {
  return (
    <tr aria-hidden="true">
      <td colSpan={columns} style={{ height, padding: 0, border: 0 }} />
    </tr>
  );
}
