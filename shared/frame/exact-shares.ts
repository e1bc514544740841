import { clippedOverlap, sumOf, type Fraction } from "./exact-overlap.ts";
import type { LatticeRings } from "./edges.ts";
import type { Lattice } from "./lattice.ts";
import type { Pieces } from "./pieces.ts";
import { exactShare } from "./share-rounding.ts";
import type { Doubtful } from "./sweep.ts";

/** The doubtful cells of one row, columns ascending. */
interface DoubtfulRow {
  readonly row: number;
  readonly columns: readonly number[];
  readonly pieces: readonly number[];
  /** By cell and one more: what edges wholly west of cell k add, in mm of height, as differences along k. */
  readonly coverSteps: Float64Array;
  /** By cell: the edges that may pass through it. */
  readonly overlaps: Fraction[][];
}

/** Recomputes doubtful shares in whole numbers from the edges that pass through their row, and writes them to the pieces. */
export function settleDoubtful(rings: LatticeRings, lattice: Lattice, doubtful: Doubtful, pieces: Pieces): void {
  const rows = groupByRow(doubtful);
  const { xy, ringStart, upSign } = rings;
  for (let ring = 0; ring < rings.rings; ring += 1) {
    const start = ringStart[ring] ?? 0;
    const end = ringStart[ring + 1] ?? 0;
    const sign = upSign[ring] ?? 1;
    let x1 = xy[2 * end - 2] ?? 0;
    let y1 = xy[2 * end - 1] ?? 0;
    for (let i = start; i < end; i += 1) {
      const x2 = xy[2 * i] ?? 0;
      const y2 = xy[2 * i + 1] ?? 0;
      if (y1 < y2) addEdge(rows, lattice, x1, y1, x2, y2, sign);
      else if (y2 < y1) addEdge(rows, lattice, x2, y2, x1, y1, -sign);
      x1 = x2;
      y1 = y2;
    }
  }
  const cell = BigInt(2 * lattice.width) * BigInt(lattice.height);
  for (const row of rows) {
    let cover = 0;
    row.columns.forEach((_, k) => {
      cover += row.coverSteps[k] ?? 0;
      const overlaps = row.overlaps[k] ?? [];
      const west = { numerator: 2n * BigInt(lattice.width) * BigInt(cover), denominator: 1n };
      const { numerator, denominator } = sumOf([west, ...overlaps]);
      pieces.share[row.pieces[k] ?? 0] = exactShare(numerator, denominator, cell);
    });
  }
}

/** Rows from the south, so that they can be found by bisection. */
function groupByRow(doubtful: Doubtful): DoubtfulRow[] {
  const byRow = new Map<number, { columns: number[]; pieces: number[] }>();
  doubtful.row.forEach((row, index) => {
    const group = byRow.get(row) ?? { columns: [], pieces: [] };
    byRow.set(row, group);
    group.columns.push(doubtful.column[index] ?? 0);
    group.pieces.push(doubtful.piece[index] ?? 0);
  });
  return [...byRow]
    .sort(([a], [b]) => a - b)
    .map(([row, { columns, pieces }]) => ({
      row,
      columns,
      pieces,
      coverSteps: new Float64Array(columns.length + 1),
      overlaps: columns.map(() => []),
    }));
}

/** The first index whose value is at least `wanted`; the length where none is. */
function firstAtLeast<Item>(items: readonly Item[], wanted: number, value: (item: Item) => number): number {
  let low = 0;
  let high = items.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    const item = items[middle];
    if (item !== undefined && value(item) < wanted) low = middle + 1;
    else high = middle;
  }
  return low;
}

const rowOf = (row: DoubtfulRow): number => row.row;
const itself = (column: number): number => column;

/** An upward edge, in every doubtful row that it passes. */
function addEdge(
  rows: readonly DoubtfulRow[],
  lattice: Lattice,
  x1: number,
  y1: number,
  x2: number,
  y2: number,
  sign: number,
): void {
  const { width, height } = lattice;
  const lastRow = Math.ceil(y2 / height) - 1;
  for (let at = firstAtLeast(rows, Math.floor(y1 / height), rowOf); at < rows.length; at += 1) {
    const row = rows[at];
    if (row === undefined || row.row > lastRow) return;
    const bottom = Math.max(y1, row.row * height);
    const top = Math.min(y2, (row.row + 1) * height);
    const slope = (x2 - x1) / (y2 - y1);
    const bottomX = x1 + (bottom - y1) * slope;
    const topX = x1 + (top - y1) * slope;
    // A column more on each side than the rounded places say; which part lies in a cell is then found exactly.
    const firstColumn = Math.floor(Math.min(bottomX, topX) / width) - 1;
    const lastColumn = Math.floor(Math.max(bottomX, topX) / width) + 1;
    const from = firstAtLeast(row.columns, firstColumn, itself);
    const to = firstAtLeast(row.columns, lastColumn + 1, itself);
    row.coverSteps[to] = (row.coverSteps[to] ?? 0) + sign * (top - bottom);
    for (let k = from; k < to; k += 1) {
      const left = (row.columns[k] ?? 0) * width;
      const overlap = clippedOverlap({ x1, y1, x2, y2 }, left, width, bottom, top);
      if (overlap.numerator === 0n) continue;
      row.overlaps[k]?.push({
        numerator: sign < 0 ? -overlap.numerator : overlap.numerator,
        denominator: overlap.denominator,
      });
    }
  }
}
