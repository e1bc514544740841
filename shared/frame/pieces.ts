/** Pieces of rows (see CellRows) while they are made, in memory that the next call uses again. */
export interface Pieces {
  count: number;
  first: Int32Array;
  last: Int32Array;
  share: Int32Array;
  centreIn: Uint8Array;
}

export const emptyPieces = (): Pieces => ({
  count: 0,
  first: new Int32Array(0),
  last: new Int32Array(0),
  share: new Int32Array(0),
  centreIn: new Uint8Array(0),
});

/** Makes room for `most` pieces and forgets what was there. */
export function clearPieces(pieces: Pieces, most: number): void {
  pieces.count = 0;
  if (pieces.first.length >= most) return;
  const room = most + (most >> 2);
  pieces.first = new Int32Array(room);
  pieces.last = new Int32Array(room);
  pieces.share = new Int32Array(room);
  pieces.centreIn = new Uint8Array(room);
}

/** Adds a piece and gives its number. */
export function addCells(pieces: Pieces, first: number, last: number, share: number, centreIn: number): number {
  const at = pieces.count;
  pieces.count = at + 1;
  pieces.first[at] = first;
  pieces.last[at] = last;
  pieces.share[at] = share;
  pieces.centreIn[at] = centreIn;
  return at;
}
