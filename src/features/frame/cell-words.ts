import type { FrameCells } from "#shared/frame/cells.ts";
import type { CellAddress } from "#shared/frame/cell-spec.ts";
import { labelOf, unitAt, unitOf } from "#shared/frame/list.ts";
import { WHOLE_CELL } from "#shared/units/metric.ts";
import { formatNumber, formatPercent } from "../../components/ui/format.ts";

/** What is told of a cell of a frame: label, unit, how much of it lies inside. */
export interface CellWords {
  readonly title: string;
  readonly note: string;
  readonly text: string;
}

/** A share for people: whole, or a percentage that never rounds to none or all. */
export function shareText(share: number): string {
  if (share === WHOLE_CELL) return "wholly inside";
  const part = share / WHOLE_CELL;
  if (part < 0.0005) return "less than 0.1\u00a0% inside";
  return part > 0.9995 ? "more than 99.9\u00a0% inside" : `${formatPercent(part)} inside`;
}

/** The words of the cell at a place of the lattice, or null where the frame has none. */
export function cellWords(cells: FrameCells, { column, row }: CellAddress): CellWords | null {
  const unit = unitOf(cells, column, row);
  if (unit === null) return null;
  return {
    title: labelOf(cells, column, row),
    note: `unit ${formatNumber(unit)}`,
    text: shareText(unitAt(cells, unit).share),
  };
}

/** Column letters as a number from 0: A is 0, Z 25, AA 26. */
function columnOf(letters: string): number {
  return Array.from(letters).reduce((sum, letter) => 26 * sum + letter.charCodeAt(0) - 64, 0) - 1;
}

/** The cell that a label ("AC25") or a unit number ("651") names; null where the frame has none. */
export function findCell(cells: FrameCells, typed: string): CellAddress | null {
  const text = typed
    .trim()
    .toUpperCase()
    .replace(/^UNIT\s*/, "");
  if (/^\d+$/.test(text)) {
    const unit = Number(text);
    if (unit < 1 || unit > cells.units) return null;
    const { column, row } = unitAt(cells, unit);
    return { column, row };
  }
  const match = /^([A-Z]{1,6})\s*(\d{1,9})$/.exec(text);
  if (match === null) return null;
  const column = cells.leftColumn + columnOf(match[1] ?? "");
  const row = cells.topRow - (Number(match[2]) - 1);
  return unitOf(cells, column, row) === null ? null : { column, row };
}

/** From the first label to the last: "A1 to AF31". */
export function labelRange(cells: FrameCells): string {
  const last = labelOf(cells, cells.leftColumn + cells.columns - 1, cells.topRow - (cells.rows - 1));
  return `A1 to ${last}`;
}
