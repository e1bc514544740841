import type { CellRows } from "#shared/frame/cells.ts";

/** All cells of rows of pieces as objects, in list order: for tests on small frames. */
export function listed(cells: CellRows): { column: number; row: number; share: number; piece: number }[] {
  const all: { column: number; row: number; share: number; piece: number }[] = [];
  for (let i = 0; i < cells.rows; i += 1) {
    for (let piece = cells.rowStart[i] ?? 0; piece < (cells.rowStart[i + 1] ?? 0); piece += 1) {
      for (let column = cells.first[piece] ?? 0; column <= (cells.last[piece] ?? 0); column += 1) {
        all.push({
          column: cells.leftColumn + column,
          row: cells.topRow - i,
          share: cells.share[piece] ?? 0,
          piece,
        });
      }
    }
  }
  return all;
}
