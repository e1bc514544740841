import type { PlanePolygon, Ring } from "./rings.ts";

/**
 * Straight edges between whole millimetres: edge k runs from (ends[4k], ends[4k + 1]) to (ends[4k + 2], ends[4k + 3]), its first end
 * the one further west (south, where both are as far west). No edge is a point.
 */
export interface EdgeSet {
  readonly count: number;
  readonly ends: Float64Array;
}

/** All edges of rings, each with its first end in the west; edges that are points are dropped. */
export function edgesOf(rings: readonly Ring[]): EdgeSet {
  const numbers = rings.reduce((sum, ring) => sum + ring.length, 0);
  const ends = new Float64Array(2 * numbers);
  let count = 0;
  for (const ring of rings) {
    let x1 = ring[ring.length - 2] ?? 0;
    let y1 = ring[ring.length - 1] ?? 0;
    for (let i = 0; i < ring.length; i += 2) {
      const x2 = ring[i] ?? 0;
      const y2 = ring[i + 1] ?? 0;
      if (x1 !== x2 || y1 !== y2) {
        writeEdge(ends, count, x1, y1, x2, y2);
        count += 1;
      }
      x1 = x2;
      y1 = y2;
    }
  }
  return { count, ends };
}

export function writeEdge(ends: Float64Array, at: number, x1: number, y1: number, x2: number, y2: number): void {
  const forward = x1 < x2 || (x1 === x2 && y1 < y2);
  ends[4 * at] = forward ? x1 : x2;
  ends[4 * at + 1] = forward ? y1 : y2;
  ends[4 * at + 2] = forward ? x2 : x1;
  ends[4 * at + 3] = forward ? y2 : y1;
}

/** Compares two edges by their four numbers, in order. */
function compareEdges(ends: Float64Array, a: number, b: number): number {
  for (let i = 0; i < 4; i += 1) {
    const difference = (ends[4 * a + i] ?? 0) - (ends[4 * b + i] ?? 0);
    if (difference !== 0) return difference;
  }
  return 0;
}

/**
 * Sorts the edges and keeps one of each that is there an odd number of times: under the even–odd rule two equal edges divide
 * nothing from nothing.
 */
export function oddEdges({ count, ends }: EdgeSet): EdgeSet {
  const order = new Int32Array(count).map((_, index) => index).sort((a, b) => compareEdges(ends, a, b));
  const kept = new Float64Array(4 * count);
  let size = 0;
  for (let i = 0; i < count;) {
    const edge = order[i] ?? 0;
    let next = i + 1;
    while (next < count && compareEdges(ends, edge, order[next] ?? 0) === 0) next += 1;
    if ((next - i) % 2 === 1) {
      kept.set(ends.subarray(4 * edge, 4 * edge + 4), 4 * size);
      size += 1;
    }
    i = next;
  }
  return { count: size, ends: kept.slice(0, 4 * size) };
}

/** All rings of polygons, one after the other. */
export const ringsOf = (polygons: readonly PlanePolygon[]): Ring[] => polygons.flat();
