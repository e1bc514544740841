import { useRef, type KeyboardEvent, type ReactNode } from "react";
import { classes } from "./classes.ts";
import type { DataColumn, RowTone } from "./data-column.ts";
import { DataTableHead } from "./DataTableHead.tsx";
import { DataTableRow } from "./DataTableRow.tsx";
import { useShowChosen } from "./use-show-chosen.ts";
import { useSortedRows, type SortState } from "./use-sorted-rows.ts";
import { useVisibleLines } from "./use-visible-lines.ts";

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
  /** The table scrolls in a frame of at most this height in px; above 200 rows it always does (560) and holds only the rows in sight. */
  readonly maxHeight?: number;
  readonly dense?: boolean;
}

interface Line<Row> {
  readonly key: string;
  readonly id: string;
  readonly row: Row;
  readonly index: number;
  readonly detail: ReactNode;
}

/** Moves the focus to the next or previous row, the first or the last; true where the key was one of those. */
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

/** The row that the Tab key reaches: the chosen one, or the first in the page. */
function tabStop<Row>(indices: readonly number[], lines: readonly Line<Row>[], chosen: string | null): number {
  const inPage = indices.map((index) => lines[index]);
  return (inPage.find((line) => line?.id === chosen) ?? inPage[0])?.index ?? 0;
}

/** Rows, each with what is open below it as a line of its own. */
function linesOf<Row>(
  rows: readonly Row[],
  rowId: (row: Row) => string,
  detail: ((row: Row) => ReactNode) | undefined,
): Line<Row>[] {
  return rows.flatMap((row, index) => {
    const id = rowId(row);
    const line = { key: id, id, row, index, detail: undefined };
    const below = detail?.(row);
    return below === undefined || below === null || below === false
      ? [line]
      : [line, { ...line, key: `${id}/detail`, detail: below }];
  });
}

/** A sortable table over any number of rows. Lists above 200 rows keep only the rows in sight in the page. */
export function DataTable<Row extends object>(props: DataTableProps<Row>) {
  const { caption, columns, rowId, chosen = null, onChoose, tone, empty, maxHeight, dense = false } = props;
  const { rows, sorted, sortBy } = useSortedRows(props.rows, columns, props.initialSort);
  const frame = useRef<HTMLDivElement>(null);
  const lines = linesOf(rows, rowId, props.detail);
  const { virtual, indices, before, after, measure, scrollTo } = useVisibleLines(
    lines.map((line) => line.key),
    frame,
  );
  const focusable = tabStop(indices, lines, chosen);
  const show = (row: number) => scrollTo(lines.findIndex((line) => line.index === row));
  useShowChosen(frame, chosen, () => rows.findIndex((row) => rowId(row) === chosen), virtual ? show : undefined);
  const choice = (line: Line<Row>) =>
    onChoose === undefined
      ? null
      : {
          chosen: line.id === chosen,
          focusable: line.index === focusable,
          choose: () => onChoose(line.id, line.row),
          move: (event: KeyboardEvent<HTMLTableRowElement>) => moveFocus(event, line.index, rows.length, show),
        };
  const height = maxHeight ?? (virtual ? 560 : undefined);
  const scrolls =
    height === undefined
      ? {}
      : {
          style: { maxHeight: height },
          role: "group",
          "aria-label": caption,
          ...(onChoose === undefined && { tabIndex: 0 }),
        };
  return (
    <div ref={frame} className="q-table-scroll q-table-sticky" {...scrolls}>
      <table
        className={classes("q-table", dense && "q-table-dense")}
        role={onChoose === undefined ? undefined : "grid"}
        aria-rowcount={virtual ? rows.length + 1 : undefined}
      >
        <caption className="sr-only">{caption}</caption>
        <DataTableHead columns={columns} sorted={sorted} sortBy={sortBy} />
        <tbody>
          <Gap height={before} columns={columns.length} />
          {indices.map((index) => {
            const line = lines[index];
            if (line === undefined) return null;
            if (line.detail === undefined) {
              return (
                <DataTableRow
                  key={line.key}
                  ref={measure}
                  row={line.row}
                  id={line.id}
                  index={line.index}
                  line={index}
                  columns={columns}
                  tone={tone?.(line.row)}
                  choice={choice(line)}
                  numbered={virtual}
                />
              );
            }
            return (
              <tr key={line.key} ref={measure} data-index={index}>
                <td colSpan={columns.length}>{line.detail}</td>
              </tr>
            );
          })}
          <Gap height={after} columns={columns.length} />
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
  if (height <= 0) return null;
  return (
    <tr aria-hidden="true">
      <td colSpan={columns} style={{ height, padding: 0, border: 0 }} />
    </tr>
  );
}
