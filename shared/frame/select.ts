import { Problem } from "#shared/problem.ts";
import { WHOLE_CELL } from "#shared/units/metric.ts";
import { checkMembership, type CellAddress, type Membership } from "./cell-spec.ts";
import { MOST_UNITS, type FrameCells, type MeasuredCells } from "./cells.ts";
import { inListOrder, isMember } from "./member.ts";

/** What the members span, before single cells are left out: lattice of labels (rule R4). */
interface Extent {
  readonly firstColumn: number;
  readonly lastColumn: number;
  readonly firstRow: number;
  readonly lastRow: number;
  readonly pieces: number;
  readonly units: number;
}

/** Pieces of the frame while they are written; columns count from the extent's west. */
interface Written {
  readonly first: Int32Array;
  readonly last: Int32Array;
  readonly share: Int32Array;
  readonly unitsBefore: Int32Array;
  count: number;
}

/**
 * The units of a frame: the measured cells that a membership takes, without those left out. A cell left out that is no member
 * changes nothing; labels count from the lattice before cells are left out.
 * @throws Problem `frame-empty` where nothing is left, `frame-too-large` above 10,000,000 units, `cell-size` on a bad share.
 */
export function selectCells(
  measured: MeasuredCells,
  membership: Membership,
  leftOut: readonly CellAddress[],
): FrameCells {
  const rule = checkMembership(membership);
  const extent = extentOf(measured, rule);
  if (extent.units > MOST_UNITS) {
    throw new Problem(
      "frame-too-large",
      `The frame would hold ${extent.units} cells; at most ${MOST_UNITS} fit. Make the cells larger.`,
    );
  }
  const gone = inListOrder(leftOut);
  const most = extent.pieces + gone.length;
  const written: Written = {
    first: new Int32Array(most),
    last: new Int32Array(most),
    share: new Int32Array(most),
    unitsBefore: new Int32Array(most + 1),
    count: 0,
  };
  const rows = extent.lastRow - extent.firstRow + 1;
  const rowStart = new Int32Array(rows + 1);
  let nextGone = 0;
  for (let i = 0; i < rows; i += 1) {
    nextGone = writeRow(measured, rule, extent, i, gone, nextGone, written);
    rowStart[i + 1] = written.count;
  }
  const units = written.unitsBefore[written.count] ?? 0;
  if (units === 0) throw new Problem("frame-empty", "Every cell is left out. Put some back.");
  return {
    leftColumn: measured.leftColumn + extent.firstColumn,
    topRow: measured.topRow - extent.firstRow,
    columns: extent.lastColumn - extent.firstColumn + 1,
    rows,
    rowStart,
    first: written.first.slice(0, written.count),
    last: written.last.slice(0, written.count),
    share: written.share.slice(0, written.count),
    units,
    unitsBefore: written.unitsBefore.slice(0, written.count + 1),
  };
}

function extentOf(measured: MeasuredCells, rule: Membership): Extent {
  let [firstColumn, lastColumn, firstRow, lastRow, pieces, units] = [Infinity, -1, -1, -1, 0, 0];
  for (let row = 0; row < measured.rows; row += 1) {
    const end = measured.rowStart[row + 1] ?? 0;
    for (let piece = measured.rowStart[row] ?? 0; piece < end; piece += 1) {
      if (!isMember(measured, piece, rule)) continue;
      const first = measured.first[piece] ?? 0;
      const last = measured.last[piece] ?? 0;
      if (first < firstColumn) firstColumn = first;
      if (last > lastColumn) lastColumn = last;
      if (firstRow < 0) firstRow = row;
      lastRow = row;
      pieces += 1;
      units += last - first + 1;
    }
  }
  if (pieces === 0) {
    throw new Problem(
      "frame-empty",
      "No cell meets the edge rule. Make the cells smaller, or count in every cell that the area touches.",
    );
  }
  return { firstColumn, lastColumn, firstRow, lastRow, pieces, units };
}

/** Writes row i of the extent; gives the index of the first cell left out that lies further south. */
function writeRow(
  measured: MeasuredCells,
  rule: Membership,
  extent: Extent,
  i: number,
  gone: readonly CellAddress[],
  nextGone: number,
  written: Written,
): number {
  const rowIndex = extent.firstRow + i;
  const row = measured.topRow - rowIndex;
  const rowFirstPiece = written.count;
  let next = nextGone;
  while ((gone[next]?.row ?? -Infinity) > row) next += 1;
  const end = measured.rowStart[rowIndex + 1] ?? 0;
  for (let piece = measured.rowStart[rowIndex] ?? 0; piece < end; piece += 1) {
    if (!isMember(measured, piece, rule)) continue;
    let first = measured.first[piece] ?? 0;
    const last = measured.last[piece] ?? 0;
    const share = measured.share[piece] ?? 0;
    for (; gone[next]?.row === row; next += 1) {
      const column = (gone[next]?.column ?? 0) - measured.leftColumn;
      if (column > last) break;
      if (column < first) continue;
      writePiece(written, rowFirstPiece, first - extent.firstColumn, column - 1 - extent.firstColumn, share);
      first = column + 1;
    }
    writePiece(written, rowFirstPiece, first - extent.firstColumn, last - extent.firstColumn, share);
  }
  return next;
}

/** Adds a piece; whole cells next to whole cells become one run, so that equal lists are equal arrays. */
function writePiece(written: Written, rowFirstPiece: number, first: number, last: number, share: number): void {
  if (last < first) return;
  const length = last - first + 1;
  const before = written.count - 1;
  if (
    share === WHOLE_CELL &&
    before >= rowFirstPiece &&
    written.share[before] === WHOLE_CELL &&
    written.last[before] === first - 1
  ) {
    written.last[before] = last;
    written.unitsBefore[before + 1] = (written.unitsBefore[before + 1] ?? 0) + length;
    return;
  }
  const at = written.count;
  written.first[at] = first;
  written.last[at] = last;
  written.share[at] = share;
  written.unitsBefore[at + 1] = (written.unitsBefore[at] ?? 0) + length;
  written.count = at + 1;
}
