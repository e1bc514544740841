import type { CellRows } from "#shared/frame/cells.ts";
import { WHOLE_CELL } from "#shared/units/metric.ts";
import type { CellGrid, PlaneRing } from "./sheet-geometry.ts";

/** Where a tile lies: metres at its upper left corner, px a metre, its side in px. */
export interface TilePlace {
  readonly west: number;
  readonly north: number;
  readonly scale: number;
  readonly size: number;
}

export interface CellColours {
  readonly line: string;
  readonly edge: string;
}

/** The part of a canvas context that painting needs. */
export type Pen = Pick<
  CanvasRenderingContext2D,
  | "fillStyle"
  | "strokeStyle"
  | "lineWidth"
  | "rect"
  | "beginPath"
  | "moveTo"
  | "lineTo"
  | "closePath"
  | "fill"
  | "stroke"
  | "clip"
  | "save"
  | "restore"
>;

/** Cells under this many px have no lines of their own. */
const LINES_FROM = 6;
/** Under this many px nobody sees whether a tint stops at the boundary: its line is as wide. */
const CLIP_FROM = 2;

/** The first piece of a row whose last column is not west of `column`; the row's end where there is none. */
function firstPiece(cells: CellRows, from: number, to: number, column: number): number {
  let low = from;
  let high = to;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if ((cells.last[middle] ?? 0) + cells.leftColumn < column) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Calls back for each piece of cells in sight: lattice row, first and last column, cut down to the columns in sight, and whether it is cut by the boundary. */
export function eachPiece(
  cells: CellRows,
  grid: CellGrid,
  tile: TilePlace,
  callback: (row: number, first: number, last: number, edge: boolean) => void,
): void {
  const span = tile.size / tile.scale;
  const westColumn = Math.floor((tile.west * 1000 - grid.originEastMm) / grid.widthMm);
  const eastColumn = Math.floor(((tile.west + span) * 1000 - grid.originEastMm) / grid.widthMm);
  const northRow = Math.floor((tile.north * 1000 - grid.originNorthMm) / grid.heightMm);
  const southRow = Math.floor(((tile.north - span) * 1000 - grid.originNorthMm) / grid.heightMm);
  const from = Math.max(0, cells.topRow - northRow);
  const to = Math.min(cells.rows - 1, cells.topRow - southRow);
  for (let i = from; i <= to; i += 1) {
    const end = cells.rowStart[i + 1] ?? 0;
    for (let k = firstPiece(cells, cells.rowStart[i] ?? 0, end, westColumn); k < end; k += 1) {
      const first = (cells.first[k] ?? 0) + cells.leftColumn;
      if (first > eastColumn) break;
      const last = (cells.last[k] ?? 0) + cells.leftColumn;
      callback(
        cells.topRow - i,
        Math.max(first, westColumn),
        Math.min(last, eastColumn),
        cells.share[k] !== WHOLE_CELL,
      );
    }
  }
}

/**
 * Paints the cells of one tile: cells cut by the boundary tinted (inside `clip` where only their inner part is counted), then cell lines.
 * Whole cells have the tint of the area below and cost nothing; what is drawn grows with the rows and runs in sight, not with the cells.
 */
export function paintCells(
  pen: Pen,
  cells: CellRows,
  grid: CellGrid,
  tile: TilePlace,
  colours: CellColours,
  clip: readonly FlatRing[] | null,
): void {
  const width = (grid.widthMm / 1000) * tile.scale;
  const height = (grid.heightMm / 1000) * tile.scale;
  const x = (column: number) => ((grid.originEastMm + column * grid.widthMm) / 1000 - tile.west) * tile.scale;
  const y = (row: number) => (tile.north - (grid.originNorthMm + row * grid.heightMm) / 1000) * tile.scale;
  const edges: [number, number, number][] = [];
  const runs: [number, number, number][] = [];
  const withLines = Math.min(width, height) >= LINES_FROM;
  eachPiece(cells, grid, tile, (row, first, last, edge) => {
    if (edge) edges.push([row, first, last]);
    if (withLines) runs.push([row, first, last]);
  });
  if (edges.length === 0 && runs.length === 0) return;
  pen.save();
  if (clip !== null && edges.length > 0 && Math.min(width, height) >= CLIP_FROM) clipTo(pen, clip, tile);
  pen.fillStyle = colours.edge;
  pen.beginPath();
  for (const [row, first, last] of edges)
    pen.rect(x(first), y(row + 1), Math.max(1, x(last + 1) - x(first)), Math.max(1, height));
  pen.fill();
  if (withLines) {
    pen.strokeStyle = colours.line;
    pen.lineWidth = 0.6;
    pen.beginPath();
    for (const [row, first, last] of runs) {
      for (const level of [y(row), y(row + 1)]) {
        pen.moveTo(x(first), level);
        pen.lineTo(x(last + 1), level);
      }
      for (let column = first; column <= last + 1; column += 1) {
        pen.moveTo(x(column), y(row));
        pen.lineTo(x(column), y(row + 1));
      }
    }
    pen.stroke();
  }
  pen.restore();
}

/** Rings in metres, x0, y0, x1, y1 …: what many tiles are cut to, without an object a vertex. */
export type FlatRing = Float64Array;

export function flatRings(rings: readonly PlaneRing[]): FlatRing[] {
  return rings.map((ring) => {
    const flat = new Float64Array(2 * ring.length);
    ring.forEach(([x, y], index) => {
      flat[2 * index] = x / 1000;
      flat[2 * index + 1] = y / 1000;
    });
    return flat;
  });
}

/** The rings without vertices nearer than 0.3 px to the one before, for one scale; done once for all tiles of a zoom. */
export function thinnedRings(rings: readonly FlatRing[], scale: number): FlatRing[] {
  const near = 0.3 / scale;
  return rings.map((ring) => {
    const kept = new Float64Array(ring.length);
    let length = 0;
    let lastX = NaN;
    let lastY = NaN;
    for (let i = 0; i < ring.length; i += 2) {
      const x = ring[i] ?? 0;
      const y = ring[i + 1] ?? 0;
      if (Math.abs(x - lastX) < near && Math.abs(y - lastY) < near) continue;
      kept[length] = x;
      kept[length + 1] = y;
      length += 2;
      lastX = x;
      lastY = y;
    }
    return kept.slice(0, length);
  });
}

/** On which outer sides of the tile a place lies: 1 west, 2 east, 4 north, 8 south. */
function sides(x: number, y: number, size: number): number {
  return (x < -2 ? 1 : x > size + 2 ? 2 : 0) | (y < -2 ? 4 : y > size + 2 ? 8 : 0);
}

/**
 * Clips to the inside of the rings (even–odd). A vertex that lies with both its neighbours beyond the same side of the tile is left
 * out: inside the tile nothing changes, and a long boundary costs only what is near.
 */
function clipTo(pen: Pen, rings: readonly FlatRing[], tile: TilePlace): void {
  pen.beginPath();
  for (const ring of rings) clipRing(pen, ring, tile);
  pen.clip("evenodd");
}

function clipRing(pen: Pen, ring: FlatRing, { west, north, scale, size }: TilePlace): void {
  let x = ((ring[0] ?? 0) - west) * scale;
  let y = (north - (ring[1] ?? 0)) * scale;
  let here = sides(x, y, size);
  let kept = -1;
  for (let i = 0; i < ring.length; i += 2) {
    const next = (i + 2) % ring.length;
    const nextX = ((ring[next] ?? 0) - west) * scale;
    const nextY = (north - (ring[next + 1] ?? 0)) * scale;
    const there = sides(nextX, nextY, size);
    if (kept < 0) pen.moveTo(x, y);
    else if ((kept & here & there) === 0) pen.lineTo(x, y);
    if (kept < 0 || (kept & here & there) === 0) kept = here;
    x = nextX;
    y = nextY;
    here = there;
  }
  pen.closePath();
}
