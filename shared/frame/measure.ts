import type { PlaneArea } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import { WHOLE_CELL } from "#shared/units/metric.ts";
import { checkCellSpec, type CellSpec } from "./cell-spec.ts";
import type { MeasuredCells } from "./cells.ts";
import { crossCentreLines } from "./centre-crossings.ts";
import { ringsOnLattice } from "./edges.ts";
import { settleDoubtful } from "./exact-shares.ts";
import { latticeOver } from "./lattice.ts";
import { clearPieces, emptyPieces } from "./pieces.ts";
import { sweepRow, type Doubtful } from "./sweep.ts";
import { walkRings, type Progress } from "./walk.ts";
import {
  clearCentres,
  clearWalk,
  emptyCentreRecords,
  emptyRowOrder,
  emptyWalkRecords,
  sortByRow,
} from "./walk-records.ts";

/** A boundary in more pieces than this belongs to a frame with more cells than a frame may hold. */
const MOST_PIECES = 12_000_000;
const TELL_EVERY_ROWS = 4096;

const walkRecords = emptyWalkRecords();
const walkOrder = emptyRowOrder();
const centreRecords = emptyCentreRecords();
const centreOrder = emptyRowOrder();
const pieces = emptyPieces();

/**
 * Every cell's exact share and whether its centre is in (rule R3), for all memberships at once, in one walk along the boundary:
 * work and memory follow the boundary and the rows, not the number of cells. Sums are made in double precision with a bound
 * of their error; a share that they don't decide is computed again in whole numbers.
 *
 * The rings must be noded (geometry/noding.ts); which way they run does not matter.
 * @throws Problem `cell-size`, or `frame-too-large` where the boundary alone passes through too many cells; a RangeError on
 *   rings that overlap; whatever `onProgress` throws.
 */
export function measureCells(area: PlaneArea, spec: CellSpec, onProgress?: Progress): MeasuredCells {
  const checked = checkCellSpec(spec);
  const lattice = latticeOver(area, checked);
  const rings = ringsOnLattice(area, lattice);
  if (rings.mostPieces > MOST_PIECES) {
    throw new Problem(
      "frame-too-large",
      `The boundary alone would pass through about ${rings.mostPieces} cells. Make the cells larger.`,
    );
  }
  clearWalk(walkRecords, rings.mostPieces);
  walkRings(rings, lattice, walkRecords, onProgress);
  clearCentres(centreRecords, rings.mostPieces);
  crossCentreLines(rings, lattice, centreRecords);
  sortByRow(walkOrder, walkRecords, lattice.columns, lattice.rows);
  sortByRow(centreOrder, centreRecords, lattice.columns, lattice.rows);

  clearPieces(pieces, 2 * walkRecords.count);
  const doubtful: Doubtful = { row: [], column: [], piece: [] };
  const touched = { records: walkRecords, sorted: walkOrder };
  const crossed = { records: centreRecords, sorted: centreOrder };
  const rowStart = new Int32Array(lattice.rows + 1);
  for (let i = 0; i < lattice.rows; i += 1) {
    if (i % TELL_EVERY_ROWS === 0) onProgress?.(i, lattice.rows);
    sweepRow(lattice.rows - 1 - i, lattice, touched, crossed, pieces, doubtful);
    rowStart[i + 1] = pieces.count;
  }
  if (doubtful.row.length > 0) settleDoubtful(rings, lattice, doubtful, pieces);
  checkShares(pieces.share, pieces.count);
  return {
    spec: checked,
    leftColumn: lattice.leftColumn,
    topRow: lattice.bottomRow + lattice.rows - 1,
    columns: lattice.columns,
    rows: lattice.rows,
    rowStart,
    first: pieces.first.slice(0, pieces.count),
    last: pieces.last.slice(0, pieces.count),
    share: pieces.share.slice(0, pieces.count),
    centreIn: pieces.centreIn.slice(0, pieces.count),
    twiceAreaMm2: rings.twiceAreaMm2,
  };
}

function checkShares(share: Int32Array, count: number): void {
  for (let piece = 0; piece < count; piece += 1) {
    const value = share[piece] ?? 0;
    if (value < 0 || value > WHOLE_CELL) throw new RangeError(`the rings overlap: a cell has ${value} billionths`);
  }
}
