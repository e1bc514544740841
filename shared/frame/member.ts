import { WHOLE_CELL } from "#shared/units/metric.ts";
import type { CellAddress, Membership } from "./cell-spec.ts";
import type { CellRows, MeasuredCells } from "./cells.ts";

/** Whether the cells of a measured piece belong to the frame (rule R3). */
export function isMember(measured: MeasuredCells, piece: number, membership: Membership): boolean {
  const share = measured.share[piece] ?? 0;
  switch (membership.rule) {
    case "touch":
      return share > 0;
    case "centre":
      return measured.centreIn[piece] === 1;
    case "inside":
      return share === WHOLE_CELL;
    case "share":
      return share >= membership.atLeast;
  }
}

/** Number of the piece that holds a cell, or −1 where none does. */
export function pieceOf(cells: CellRows, { column, row }: CellAddress): number {
  const rowIndex = cells.topRow - row;
  if (rowIndex < 0 || rowIndex >= cells.rows) return -1;
  const wanted = column - cells.leftColumn;
  let low = cells.rowStart[rowIndex] ?? 0;
  let high = (cells.rowStart[rowIndex + 1] ?? 0) - 1;
  while (low <= high) {
    const middle = (low + high) >> 1;
    if ((cells.last[middle] ?? 0) < wanted) low = middle + 1;
    else if ((cells.first[middle] ?? 0) > wanted) high = middle - 1;
    else return middle;
  }
  return -1;
}

/** The addresses in list order (from the north, west to east), each once. */
export function inListOrder<Cell extends CellAddress>(cells: readonly Cell[]): Cell[] {
  const sorted = [...cells].sort((a, b) => b.row - a.row || a.column - b.column);
  return sorted.filter((cell, i) => {
    const before = sorted[i - 1];
    return before?.row !== cell.row || before.column !== cell.column;
  });
}
