import { WHOLE_CELL } from "#shared/units/metric.ts";
import type { Lattice } from "./lattice.ts";
import { addCells, type Pieces } from "./pieces.ts";
import { exactShare, roundedShare, UNDECIDED } from "./share-rounding.ts";
import type { CentreRecords, RowOrder, WalkRecords } from "./walk-records.ts";

/** Cells whose share the sums don't decide, by row from the north; `exact-shares.ts` settles them. */
export interface Doubtful {
  /** From the lattice's south, as in the records. */
  readonly row: number[];
  readonly column: number[];
  /** The number of its piece. */
  readonly piece: number[];
}

interface Touched {
  readonly records: WalkRecords;
  readonly sorted: RowOrder;
}

interface Crossed {
  readonly records: CentreRecords;
  readonly sorted: RowOrder;
}

const EXACT_BELOW = 9_007_199_254_740_992;
/** Billionths: four roundings of a quotient near 1 in double precision, 4·2⁻⁵³·10⁹, rounded up. */
const DOUBT_OF_DIVISION = 1e-6;

/**
 * How far a share may be off, in billionths, once m pieces with rounded ends were added. Each end is off by at most 2⁻⁵³ of
 * the cell's side, which makes a piece's area off by at most 12·2⁻⁵³ of the cell; each addition rounds a sum of at most m
 * cells. With 2⁻⁵³·10⁹ ≈ 1.1e-7: less than 1.4e-6·m + 2.3e-7·m².
 */
const doubtOf = (parts: number, partsSquared: number): number => DOUBT_OF_DIVISION + 2e-6 * parts + 4e-7 * partsSquared;

/**
 * One row from west to east. `cover` is the height of the row, with sign, that the boundary has taken so far: 0 outside,
 * the whole height inside. A touched cell overlaps the area by width·(cover before + its own cover) − left/2; between touched
 * cells the cover is 0 or the whole height, and a whole height means a run of whole cells.
 */
export function sweepRow(
  row: number,
  lattice: Lattice,
  touched: Touched,
  crossed: Crossed,
  pieces: Pieces,
  doubtful: Doubtful,
): void {
  const { records, sorted } = touched;
  const { width, height } = lattice;
  const end = sorted.rowStart[row + 1] ?? 0;
  let crossing = crossed.sorted.rowStart[row] ?? 0;
  const crossingEnd = crossed.sorted.rowStart[row + 1] ?? 0;
  const firstPiece = pieces.count;
  let cover = 0;
  let rough = 0;
  let parts = 0;
  let partsSquared = 0;
  let centreIn = 0;
  let next = -1;
  for (let i = sorted.rowStart[row] ?? 0; i < end;) {
    const column = records.column[sorted.order[i] ?? 0] ?? 0;
    if (column !== next) {
      // Between touched cells nothing is open: the cover is a whole number of heights, and earlier roundings are gone.
      cover = snapCover(cover, height, row);
      if (cover !== 0) addWhole(pieces, firstPiece, next, column - 1);
      rough = 0;
      parts = 0;
      partsSquared = 0;
    }
    let ownLeft = 0;
    let ownParts = 0;
    let ownCover = 0;
    for (; i < end; i += 1) {
      const record = sorted.order[i] ?? 0;
      if (records.column[record] !== column) break;
      ownCover += records.cover[record] ?? 0;
      ownLeft += records.left[record] ?? 0;
      ownParts += (records.parts[record] ?? 0) + 1;
      rough |= records.rough[record] ?? 0;
    }
    for (; crossing < crossingEnd; crossing += 1) {
      if ((crossed.records.column[crossed.sorted.order[crossing] ?? 0] ?? 0) > column) break;
      centreIn ^= 1;
    }
    cover += ownCover;
    parts += ownParts;
    partsSquared += ownParts * ownParts;
    const share = touchedShare(2 * width * cover - ownLeft, 2 * width * height, rough, parts, partsSquared);
    if (share === UNDECIDED) {
      doubtful.row.push(row);
      doubtful.column.push(column);
      doubtful.piece.push(addCells(pieces, column, column, 0, centreIn));
    } else if (share === WHOLE_CELL && centreIn === 1) addWhole(pieces, firstPiece, column, column);
    else if (share > 0 || centreIn === 1) addCells(pieces, column, column, share, centreIn);
    next = column + 1;
  }
  if (snapCover(cover, height, row) !== 0) throw new RangeError(`the rings are open in row ${row}`);
}

function snapCover(cover: number, height: number, row: number): number {
  const heights = Math.round(cover / height);
  if (heights === 0) return 0;
  if (heights === 1) return height;
  throw new RangeError(`the rings overlap or are turned the wrong way in row ${row}: ${heights} layers`);
}

/** Twice the overlap and twice the cell in mm²; where all ends were whole and sums small enough, the overlap is exact. */
function touchedShare(overlap: number, cell: number, rough: number, parts: number, partsSquared: number): number {
  const exact = rough === 0 && cell * (parts + 1) < EXACT_BELOW;
  const share = roundedShare(overlap, cell, exact ? DOUBT_OF_DIVISION : doubtOf(parts, partsSquared));
  return share === UNDECIDED && exact ? exactShare(BigInt(overlap), 1n, BigInt(cell)) : share;
}

/** A run of whole cells; one that follows a run in the same row makes it longer. */
function addWhole(pieces: Pieces, firstPiece: number, first: number, last: number): void {
  const before = pieces.count - 1;
  if (before >= firstPiece && pieces.share[before] === WHOLE_CELL && pieces.last[before] === first - 1) {
    if (pieces.centreIn[before] === 1) {
      pieces.last[before] = last;
      return;
    }
  }
  addCells(pieces, first, last, WHOLE_CELL, 1);
}
