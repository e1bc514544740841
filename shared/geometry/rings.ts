import { Problem } from "#shared/problem.ts";

/** Corners of a closed line as x0, y0, x1, y1 … in whole millimetres; the first corner is not repeated at the end. */
export type Ring = readonly number[];

/** The outer ring first, then its holes. */
export type PlanePolygon = readonly Ring[];

/** A study area on a frame's plane (rule R1). A point is inside where a ray from it crosses the rings an odd number of times. */
export interface PlaneArea {
  readonly polygons: readonly PlanePolygon[];
}

/** A straight edge between two corners, in whole millimetres. */
export interface Segment {
  readonly fromX: number;
  readonly fromY: number;
  readonly toX: number;
  readonly toY: number;
}

/** The smallest upright rectangle that holds an area, in whole millimetres. */
export interface PlaneBounds {
  readonly minX: number;
  readonly minY: number;
  readonly maxX: number;
  readonly maxY: number;
}

/** No plane of the Earth reaches further than this; it keeps sums of coordinates well below 2⁵³. */
export const FARTHEST_MM = 1_000_000_000_000;

const EXACT_BELOW = 9_007_199_254_740_992;

/** Throws a RangeError unless the value is a whole number of millimetres within FARTHEST_MM. */
export function wholeMillimetre(value: unknown): number {
  if (typeof value !== "number" || !Number.isInteger(value) || Math.abs(value) > FARTHEST_MM) {
    throw new RangeError(`not a whole number of millimetres within a million kilometres: ${String(value)}`);
  }
  return value === 0 ? 0 : value;
}

function ringFromJson(value: unknown): Ring {
  if (!Array.isArray(value) || value.length < 3) throw new RangeError("a ring needs three corners or more");
  const ring: number[] = [];
  for (const corner of value as readonly unknown[]) {
    if (!Array.isArray(corner) || corner.length !== 2) throw new RangeError("a corner is a pair [x, y]");
    ring.push(wholeMillimetre(corner[0]), wholeMillimetre(corner[1]));
  }
  return ring;
}

/**
 * Reads [polygon][ring][corner][x, y] in whole millimetres, rings not closed.
 * @throws Problem `statement-invalid` that names the polygon and ring.
 */
export function ringsFromJson(value: unknown): PlaneArea {
  if (!Array.isArray(value)) throw new Problem("statement-invalid", "The rings are not a list of polygons.");
  const polygons = (value as readonly unknown[]).map((polygon, polygonIndex) => {
    if (!Array.isArray(polygon) || polygon.length === 0) {
      throw new Problem("statement-invalid", `Polygon ${polygonIndex + 1} is not a list of rings.`);
    }
    return (polygon as readonly unknown[]).map((ring, ringIndex) => {
      try {
        return ringFromJson(ring);
      } catch (error) {
        const why = error instanceof Error ? error.message : String(error);
        throw new Problem("statement-invalid", `Ring ${ringIndex + 1} of polygon ${polygonIndex + 1}: ${why}.`);
      }
    });
  });
  return { polygons };
}

/** The same area as [polygon][ring][corner][x, y]. */
export function ringsToJson(area: PlaneArea): number[][][][] {
  return area.polygons.map((polygon) =>
    polygon.map((ring) => {
      const corners: number[][] = [];
      for (let i = 0; i < ring.length; i += 2) corners.push([ring[i] ?? 0, ring[i + 1] ?? 0]);
      return corners;
    }),
  );
}

/**
 * Twice the signed area of a ring in mm², exactly: the sum over its edges of (x1 + x2 − 2·x0)·(y2 − y1), positive when
 * the ring runs counter-clockwise. Terms below 2⁵³ are added as numbers, the others as big integers.
 */
export function twiceSignedArea(ring: Ring): bigint {
  let total = 0n;
  let part = 0;
  const baseX = ring[0] ?? 0;
  let x1 = (ring[ring.length - 2] ?? 0) - baseX;
  let y1 = ring[ring.length - 1] ?? 0;
  for (let i = 0; i < ring.length; i += 2) {
    const x2 = (ring[i] ?? 0) - baseX;
    const y2 = ring[i + 1] ?? 0;
    const term = (x1 + x2) * (y2 - y1);
    const sum = part + term;
    if (Math.abs(sum) < EXACT_BELOW && Math.abs(term) < EXACT_BELOW) part = sum;
    else {
      total += BigInt(part) + BigInt(x1 + x2) * BigInt(y2 - y1);
      part = 0;
    }
    x1 = x2;
    y1 = y2;
  }
  return total + BigInt(part);
}

/** Area of outer rings less area of holes, exactly; twice, because half a square millimetre is possible. */
export function areaOf(area: PlaneArea): { readonly twiceMm2: bigint } {
  let twiceMm2 = 0n;
  for (const polygon of area.polygons) {
    polygon.forEach((ring, index) => {
      const twice = twiceSignedArea(ring);
      const size = twice < 0n ? -twice : twice;
      twiceMm2 += index === 0 ? size : -size;
    });
  }
  return { twiceMm2 };
}

/** Throws a RangeError where the area has no corner. */
export function boundsOf(area: PlaneArea): PlaneBounds {
  let minX = Infinity;
  let minY = Infinity;
  let maxX = -Infinity;
  let maxY = -Infinity;
  for (const polygon of area.polygons) {
    for (const ring of polygon) {
      for (let i = 0; i < ring.length; i += 2) {
        const x = ring[i] ?? 0;
        const y = ring[i + 1] ?? 0;
        if (x < minX) minX = x;
        if (x > maxX) maxX = x;
        if (y < minY) minY = y;
        if (y > maxY) maxY = y;
      }
    }
  }
  if (minX === Infinity) throw new RangeError("an area without corners has no bounds");
  return { minX, minY, maxX, maxY };
}

export function vertexCount(area: PlaneArea): number {
  let corners = 0;
  for (const polygon of area.polygons) for (const ring of polygon) corners += ring.length / 2;
  return corners;
}
