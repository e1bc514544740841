import { cellBox, type CellGrid, type SheetScale } from "./sheet-geometry.ts";

export interface SheetCell {
  readonly column: number;
  readonly row: number;
}

/** The outlines of many cells as one SVG path: one element however many there are. */
export function pathOfCells(cells: Iterable<SheetCell>, grid: CellGrid, at: SheetScale): string {
  const parts: string[] = [];
  for (const cell of cells) {
    const box = cellBox(grid, cell.column, cell.row, at);
    parts.push(
      `M${box.x.toFixed(2)} ${box.y.toFixed(2)}h${box.width.toFixed(2)}v${box.height.toFixed(2)}h${(-box.width).toFixed(2)}z`,
    );
  }
  return parts.join("");
}

/** Dots of 4 px at the middles of cells that are too small to be outlined. */
export function pathOfDots(cells: Iterable<SheetCell>, grid: CellGrid, at: SheetScale): string {
  const parts: string[] = [];
  for (const cell of cells) {
    const box = cellBox(grid, cell.column, cell.row, at);
    parts.push(
      `M${(box.x + box.width / 2 - 2).toFixed(2)} ${(box.y + box.height / 2).toFixed(2)}a2 2 0 1 0 4 0a2 2 0 1 0 -4 0`,
    );
  }
  return parts.join("");
}

/** Whether a cell lies at least partly in a rectangle of the plane (metres). */
export function isNear(
  cell: SheetCell,
  grid: CellGrid,
  near: { west: number; south: number; east: number; north: number },
): boolean {
  const west = (grid.originEastMm + cell.column * grid.widthMm) / 1000;
  const south = (grid.originNorthMm + cell.row * grid.heightMm) / 1000;
  return (
    west < near.east &&
    west + grid.widthMm / 1000 > near.west &&
    south < near.north &&
    south + grid.heightMm / 1000 > near.south
  );
}

/** Size of a repeat badge in px. */
export const BADGE = { width: 22, height: 17 } as const;

/**
 * Where the badge of a cell goes: the first of right, left, above, below where it covers no other drawn cell; right where all are
 * taken. `taken` tells whether a lattice cell is drawn. Gives the middle of the badge in px from the middle of the cell.
 */
export function badgePlace(
  cell: SheetCell,
  width: number,
  height: number,
  taken: (column: number, row: number) => boolean,
): { x: number; y: number } {
  const aside = width / 2 + BADGE.width / 2 + 2;
  const off = height / 2 + BADGE.height / 2 + 1.5;
  const places = [
    { x: aside, y: 0 },
    { x: -aside, y: 0 },
    { x: 0, y: -off },
    { x: 0, y: off },
  ];
  const covers = (place: { x: number; y: number }) => {
    const from = Math.floor((place.x - BADGE.width / 2) / width + 0.5);
    const to = Math.floor((place.x + BADGE.width / 2) / width + 0.5 - 1e-9);
    const below = Math.floor((-place.y - BADGE.height / 2) / height + 0.5);
    const above = Math.floor((-place.y + BADGE.height / 2) / height + 0.5 - 1e-9);
    for (let column = from; column <= to; column += 1) {
      for (let row = below; row <= above; row += 1) {
        if ((column !== 0 || row !== 0) && taken(cell.column + column, cell.row + row)) return true;
      }
    }
    return false;
  };
  return places.find((place) => !covers(place)) ?? { x: aside, y: 0 };
}
