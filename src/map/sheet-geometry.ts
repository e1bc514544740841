/** [polygon][ring][vertex][x, y] in whole millimetres of a plane: outer ring first, then holes, none closed. */
export type PlanePolygons = readonly (readonly PlaneRing[])[];
export type PlaneRing = readonly (readonly [number, number])[];

/** A rectangle of a plane, in metres. */
export interface PlaneBounds {
  readonly west: number;
  readonly south: number;
  readonly east: number;
  readonly north: number;
}

/** The smallest rectangle around all rings, in metres. Throws RangeError where there is no vertex. */
export function boundsOfPolygons(polygons: PlanePolygons): PlaneBounds {
  let west = Infinity;
  let south = Infinity;
  let east = -Infinity;
  let north = -Infinity;
  for (const polygon of polygons) {
    for (const ring of polygon) {
      for (const [x, y] of ring) {
        west = Math.min(west, x);
        east = Math.max(east, x);
        south = Math.min(south, y);
        north = Math.max(north, y);
      }
    }
  }
  if (west > east) throw new RangeError("no vertex to take bounds of");
  return { west: west / 1000, south: south / 1000, east: east / 1000, north: north / 1000 };
}

/** What is drawn at one scale: px = (east − anchorEast) · scale to the right, (anchorNorth − north) · scale down. */
export interface SheetScale {
  /** px a metre. */
  readonly scale: number;
  readonly anchorEast: number;
  readonly anchorNorth: number;
}

/**
 * The rings as an SVG path at one scale. A vertex less than 0.3 px from the one before it is left out, so that a boundary of
 * 100 000 vertices costs what can be seen of it.
 */
export function pathOfRings(rings: Iterable<PlaneRing>, at: SheetScale): string {
  const parts: string[] = [];
  for (const ring of rings) {
    let lastX = NaN;
    let lastY = NaN;
    let first = true;
    for (const [eastMm, northMm] of ring) {
      const x = (eastMm / 1000 - at.anchorEast) * at.scale;
      const y = (at.anchorNorth - northMm / 1000) * at.scale;
      if (Math.abs(x - lastX) < 0.3 && Math.abs(y - lastY) < 0.3) continue;
      parts.push(`${first ? "M" : "L"}${x.toFixed(2)} ${y.toFixed(2)}`);
      first = false;
      lastX = x;
      lastY = y;
    }
    if (!first) parts.push("Z");
  }
  return parts.join("");
}

/** Cell sizes and origin as in a frame's cell spec: whole millimetres. */
export interface CellGrid {
  readonly widthMm: number;
  readonly heightMm: number;
  readonly originEastMm: number;
  readonly originNorthMm: number;
}

/** The cell of a grid that holds a place (metres): half-open, lower and left edge belong to it. */
export function cellAt(grid: CellGrid, east: number, north: number): { column: number; row: number } {
  return {
    column: Math.floor((east * 1000 - grid.originEastMm) / grid.widthMm),
    row: Math.floor((north * 1000 - grid.originNorthMm) / grid.heightMm),
  };
}

/** The square of a cell on the screen at one scale, before panning. */
export function cellBox(
  grid: CellGrid,
  column: number,
  row: number,
  at: SheetScale,
): { x: number; y: number; width: number; height: number } {
  const west = (grid.originEastMm + column * grid.widthMm) / 1000;
  const north = (grid.originNorthMm + (row + 1) * grid.heightMm) / 1000;
  return {
    x: (west - at.anchorEast) * at.scale,
    y: (at.anchorNorth - north) * at.scale,
    width: (grid.widthMm / 1000) * at.scale,
    height: (grid.heightMm / 1000) * at.scale,
  };
}
