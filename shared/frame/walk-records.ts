/**
 * What the walk along the boundary leaves behind, one record for each stay in a cell, in typed arrays that the next call
 * uses again (new memory is dear). `count` records are filled.
 */
export interface WalkRecords {
  count: number;
  /** From the lattice's west. */
  column: Int32Array;
  /** From the lattice's south. */
  row: Int32Array;
  /** Signed height of the boundary in the cell: Σ Δy, in mm. */
  cover: Float64Array;
  /** Σ Δy·(distance of both ends from the cell's left side), in mm²: twice the area to the left of the boundary. */
  left: Float64Array;
  /** Pieces of edges that were added. */
  parts: Int32Array;
  /** 1 where an end of a piece was no whole millimetre, so that sums may be rounded. */
  rough: Uint8Array;
}

/** Where the boundary crosses the centre lines of rows: the first column whose centre is at or right of the crossing. */
export interface CentreRecords {
  count: number;
  column: Int32Array;
  row: Int32Array;
}

export const emptyWalkRecords = (): WalkRecords => ({
  count: 0,
  column: new Int32Array(0),
  row: new Int32Array(0),
  cover: new Float64Array(0),
  left: new Float64Array(0),
  parts: new Int32Array(0),
  rough: new Uint8Array(0),
});

export const emptyCentreRecords = (): CentreRecords => ({
  count: 0,
  column: new Int32Array(0),
  row: new Int32Array(0),
});

/** Makes room for `most` records and forgets what was there. */
export function clearWalk(records: WalkRecords, most: number): void {
  records.count = 0;
  if (records.column.length >= most) return;
  const room = most + (most >> 2);
  records.column = new Int32Array(room);
  records.row = new Int32Array(room);
  records.cover = new Float64Array(room);
  records.left = new Float64Array(room);
  records.parts = new Int32Array(room);
  records.rough = new Uint8Array(room);
}

export function clearCentres(records: CentreRecords, most: number): void {
  records.count = 0;
  if (records.column.length >= most) return;
  const room = most + (most >> 2);
  records.column = new Int32Array(room);
  records.row = new Int32Array(room);
}

/** Adds a piece of an edge to the record of its cell; a new record begins when the cell is another than before. */
export function addPiece(
  records: WalkRecords,
  column: number,
  row: number,
  cover: number,
  left: number,
  rough: number,
): void {
  let at = records.count - 1;
  if (at < 0 || records.column[at] !== column || records.row[at] !== row) {
    at += 1;
    records.count = at + 1;
    records.column[at] = column;
    records.row[at] = row;
    records.cover[at] = cover;
    records.left[at] = left;
    records.parts[at] = 1;
    records.rough[at] = rough;
    return;
  }
  records.cover[at] = (records.cover[at] ?? 0) + cover;
  records.left[at] = (records.left[at] ?? 0) + left;
  records.parts[at] = (records.parts[at] ?? 0) + 1;
  if (rough !== 0) records.rough[at] = 1;
}

/** Records sorted by row and, in a row, by column. */
export interface RowOrder {
  /** Numbers of records; row r holds order[rowStart[r]] … order[rowStart[r + 1] − 1]. */
  order: Int32Array;
  rowStart: Int32Array;
  spare: Int32Array;
}

export const emptyRowOrder = (): RowOrder => ({
  order: new Int32Array(0),
  rowStart: new Int32Array(0),
  spare: new Int32Array(0),
});

/** Turns counts at index key + 1 into starts; gives the array back with start[key] = number of smaller keys. */
function countKeys(counts: Int32Array, keys: Int32Array, count: number, range: number): void {
  counts.fill(0, 0, range + 2);
  for (let i = 0; i < count; i += 1) {
    const key = (keys[i] ?? 0) + 1;
    counts[key] = (counts[key] ?? 0) + 1;
  }
  for (let key = 1; key <= range; key += 1) counts[key] = (counts[key] ?? 0) + (counts[key - 1] ?? 0);
}

let columnCounts = new Int32Array(0);

/** Two stable counting sorts, first by column, then by row. */
export function sortByRow(
  sorted: RowOrder,
  records: Pick<WalkRecords, "count" | "column" | "row">,
  columns: number,
  rows: number,
): void {
  const { count, column, row } = records;
  if (sorted.order.length < count) {
    sorted.order = new Int32Array(count + (count >> 2));
    sorted.spare = new Int32Array(count + (count >> 2));
  }
  if (sorted.rowStart.length < rows + 2) sorted.rowStart = new Int32Array(rows + 2 + (rows >> 2));
  if (columnCounts.length < columns + 2) columnCounts = new Int32Array(columns + 2 + (columns >> 2));
  const { order, spare, rowStart } = sorted;
  countKeys(columnCounts, column, count, columns);
  for (let i = 0; i < count; i += 1) {
    const key = column[i] ?? 0;
    const at = columnCounts[key] ?? 0;
    columnCounts[key] = at + 1;
    spare[at] = i;
  }
  countKeys(rowStart, row, count, rows);
  for (let i = 0; i < count; i += 1) {
    const record = spare[i] ?? 0;
    const key = row[record] ?? 0;
    const at = rowStart[key] ?? 0;
    rowStart[key] = at + 1;
    order[at] = record;
  }
  // Each start has moved to the start of the next row: move them back by one row.
  rowStart.copyWithin(1, 0, rows);
  rowStart[0] = 0;
  rowStart[rows] = count;
}
