import type { LatticeRings } from "./edges.ts";
import { divided, multiplyDivide } from "./exact-division.ts";
import type { Lattice } from "./lattice.ts";
import { addPiece, type WalkRecords } from "./walk-records.ts";

/** Told now and then how far the work is; what it throws ends the work. */
export type Progress = (done: number, of: number) => void;

const TELL_EVERY = 32_768;

/**
 * The walk along the boundary. Every edge is cut at the sides of cells; each piece adds to its cell Δy (with the sign that
 * makes the inside to its right positive) and Δy·(distance of both ends from the cell's left side). Cell sides are
 * crossed at whole quotient + remainder/divisor, kept exactly from one side to the next, so that the order of crossings
 * and passing exactly through a corner are decided in whole numbers, however long the edge.
 */
export function walkRings(rings: LatticeRings, lattice: Lattice, records: WalkRecords, onProgress?: Progress): void {
  const { xy, ringStart, upSign } = rings;
  const corners = ringStart[rings.rings] ?? 0;
  for (let ring = 0; ring < rings.rings; ring += 1) {
    const start = ringStart[ring] ?? 0;
    const end = ringStart[ring + 1] ?? 0;
    for (let from = start; from < end; from += TELL_EVERY) {
      onProgress?.(from, corners);
      walkCorners(xy, start, end, from, Math.min(end, from + TELL_EVERY), upSign[ring] ?? 1, lattice, records);
    }
  }
}

/** The edges that end at the corners `from` … `to − 1` of the ring `start` … `end − 1`. */
function walkCorners(
  xy: Float64Array,
  start: number,
  end: number,
  from: number,
  to: number,
  upSign: number,
  lattice: Lattice,
  records: WalkRecords,
): void {
  const { width, height } = lattice;
  const lastColumn = lattice.columns - 1;
  const before = from === start ? end - 1 : from - 1;
  let x1 = xy[2 * before] ?? 0;
  let y1 = xy[2 * before + 1] ?? 0;
  for (let i = from; i < to; i += 1) {
    const x2 = xy[2 * i] ?? 0;
    const y2 = xy[2 * i + 1] ?? 0;
    if (y1 !== y2) {
      // An edge on the lattice's right side belongs to the last column.
      const column = Math.min(Math.floor((x1 < x2 ? x1 : x2) / width), lastColumn);
      const row = Math.floor((y1 < y2 ? y1 : y2) / height);
      const left = column * width;
      if ((x1 > x2 ? x1 : x2) <= left + width && (y1 > y2 ? y1 : y2) <= row * height + height) {
        const cover = upSign * (y2 - y1);
        addPiece(records, column, row, cover, cover * (x1 - left + (x2 - left)), 0);
      } else if (y1 < y2) walkUp(x1, y1, x2, y2, upSign, lattice, records);
      else walkUp(x2, y2, x1, y1, -upSign, lattice, records);
    } else walkLevel(Math.min(x1, x2), Math.max(x1, x2), y1, lattice, records);
    x1 = x2;
    y1 = y2;
  }
}

/** A level edge adds nothing, but the cells that it passes through are touched; along a side of cells it is no matter. */
function walkLevel(west: number, east: number, y: number, lattice: Lattice, records: WalkRecords): void {
  const { width, height } = lattice;
  const row = Math.floor(y / height);
  if (row * height === y) return;
  for (let column = Math.floor(west / width); column * width < east; column += 1) {
    addPiece(records, column, row, 0, 0, 0);
  }
}

/** An upward edge that leaves its cell; one that leans west is walked in the mirror, where it leans east. */
function walkUp(
  x1: number,
  y1: number,
  x2: number,
  y2: number,
  sign: number,
  lattice: Lattice,
  records: WalkRecords,
): void {
  if (x1 === x2) walkVertical(x1, y1, y2, sign, lattice, records);
  else if (x1 < x2) walkSlanted(x1, y1, x2, y2, sign, lattice, false, records);
  else {
    const across = lattice.columns * lattice.width;
    walkSlanted(across - x1, y1, across - x2, y2, sign, lattice, true, records);
  }
}

function walkVertical(x: number, y1: number, y2: number, sign: number, lattice: Lattice, records: WalkRecords): void {
  const { width, height } = lattice;
  const column = Math.min(Math.floor(x / width), lattice.columns - 1);
  const twiceDistance = 2 * (x - column * width);
  let row = Math.floor(y1 / height);
  for (let y = y1; y < y2; row += 1) {
    const top = Math.min(y2, (row + 1) * height);
    const cover = sign * (top - y);
    addPiece(records, column, row, cover, cover * twiceDistance, 0);
    y = top;
  }
}

function addSlanted(
  records: WalkRecords,
  lattice: Lattice,
  mirrored: boolean,
  column: number,
  row: number,
  cover: number,
  distances: number,
  rough: number,
): void {
  if (mirrored) {
    addPiece(records, lattice.columns - 1 - column, row, cover, cover * (2 * lattice.width - distances), rough);
  } else addPiece(records, column, row, cover, cover * distances, rough);
}

/** An edge with x1 < x2 and y1 < y2. Positions `atX`, `atY` are measured from the current cell's lower left corner. */
function walkSlanted(
  x1: number,
  y1: number,
  x2: number,
  y2: number,
  sign: number,
  lattice: Lattice,
  mirrored: boolean,
  records: WalkRecords,
): void {
  const { width, height } = lattice;
  const deltaX = x2 - x1;
  const deltaY = y2 - y1;
  let column = Math.floor(x1 / width);
  let row = Math.floor(y1 / height);
  const lastColumn = Math.ceil(x2 / width) - 1;
  const lastRow = Math.ceil(y2 / height) - 1;
  // Height at which the next vertical side is crossed, and place at which the next horizontal side is.
  multiplyDivide((column + 1) * width - x1, deltaY, deltaX);
  let sideY = y1 + (divided[0] ?? 0);
  let sideRest = divided[1] ?? 0;
  multiplyDivide(width, deltaY, deltaX);
  const stepY = divided[0] ?? 0;
  const stepYRest = divided[1] ?? 0;
  multiplyDivide((row + 1) * height - y1, deltaX, deltaY);
  let topX = x1 + (divided[0] ?? 0);
  let topRest = divided[1] ?? 0;
  multiplyDivide(height, deltaX, deltaY);
  const stepX = divided[0] ?? 0;
  const stepXRest = divided[1] ?? 0;
  let atX = x1 - column * width;
  let atY = y1 - row * height;
  let rough = 0;
  while (column < lastColumn || row < lastRow) {
    const top = (row + 1) * height;
    const acrossSide = sideY < top;
    const acrossTop = !acrossSide && (sideY > top || sideRest > 0);
    const endX = acrossTop ? topX - column * width + topRest / deltaY : width;
    const endY = acrossSide ? sideY - row * height + sideRest / deltaX : height;
    const roughEnd = (acrossSide && sideRest > 0) || (acrossTop && topRest > 0) ? 1 : 0;
    addSlanted(records, lattice, mirrored, column, row, sign * (endY - atY), atX + endX, rough | roughEnd);
    rough = roughEnd;
    atX = endX;
    atY = endY;
    if (!acrossTop) {
      column += 1;
      atX = 0;
      sideY += stepY;
      sideRest += stepYRest;
      if (sideRest >= deltaX) {
        sideRest -= deltaX;
        sideY += 1;
      }
    }
    if (!acrossSide) {
      row += 1;
      atY = 0;
      topX += stepX;
      topRest += stepXRest;
      if (topRest >= deltaY) {
        topRest -= deltaY;
        topX += 1;
      }
    }
  }
  const endX = x2 - column * width;
  const endY = y2 - row * height;
  addSlanted(records, lattice, mirrored, column, row, sign * (endY - atY), atX + endX, rough);
}
