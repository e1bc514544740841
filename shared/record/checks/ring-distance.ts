import Flatbush from "flatbush";
import type { PlaneArea, Ring } from "#shared/geometry/rings.ts";

/** A point of one set of rings that lies too far from another, and how far, in millimetres. */
export interface FarPoint {
  readonly eastMm: number;
  readonly northMm: number;
  readonly distanceMm: number;
}

/**
 * The first point of `from` that lies more than `most` millimetres from every edge of `to`, looked for at each vertex and in
 * the middle of each edge of `from`; null where there is none.
 */
export function fartherThan(from: PlaneArea, to: PlaneArea, most: number, tell: () => void): FarPoint | null {
  const edges = edgesOf(to);
  if (edges.length === 0) return { eastMm: 0, northMm: 0, distanceMm: Infinity };
  const index = new Flatbush(edges.length);
  for (const [x0, y0, x1, y1] of edges) {
    index.add(Math.min(x0, x1), Math.min(y0, y1), Math.max(x0, x1), Math.max(y0, y1));
  }
  index.finish();
  for (const [place, [x0, y0, x1, y1]] of edgesOf(from).entries()) {
    if (place % 1024 === 0) tell();
    for (const [x, y] of [
      [x0, y0],
      [(x0 + x1) / 2, (y0 + y1) / 2],
    ] as const) {
      const near = index.search(x - most, y - most, x + most, y + most);
      if (near.some((at) => distanceTo(edges[at], x, y) <= most)) continue;
      const distanceMm = edges.reduce((least, edge) => Math.min(least, distanceTo(edge, x, y)), Infinity);
      return { eastMm: x, northMm: y, distanceMm };
    }
  }
  return null;
}

type Edge = readonly [number, number, number, number];

function edgesOf(area: PlaneArea): Edge[] {
  return area.polygons.flatMap((rings) => rings.flatMap(ringEdges));
}

function ringEdges(ring: Ring): Edge[] {
  const edges: Edge[] = [];
  for (let i = 0; i < ring.length; i += 2) {
    const next = (i + 2) % ring.length;
    edges.push([ring[i] ?? 0, ring[i + 1] ?? 0, ring[next] ?? 0, ring[next + 1] ?? 0]);
  }
  return edges;
}

function distanceTo(edge: Edge | undefined, x: number, y: number): number {
  if (edge === undefined) return Infinity;
  const [x0, y0, x1, y1] = edge;
  const along = (x1 - x0) ** 2 + (y1 - y0) ** 2;
  const part = along === 0 ? 0 : Math.max(0, Math.min(1, ((x - x0) * (x1 - x0) + (y - y0) * (y1 - y0)) / along));
  return Math.hypot(x - (x0 + part * (x1 - x0)), y - (y0 + part * (y1 - y0)));
}
