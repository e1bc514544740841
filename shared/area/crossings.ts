import Flatbush from "flatbush";
import { orient2d } from "robust-predicates";
import type { SourcePolygon } from "#shared/area/imported-area.ts";
import type { Position } from "#shared/projection/transformer.ts";

type Edge = readonly [Position, Position];

/**
 * The first place where two edges of one polygon cross properly (each runs from one side of the other to the other side), tested
 * with exact signs; null when none do. Rings may touch; what only touches is judged by area (check.ts).
 */
export function findProperCrossing(polygon: SourcePolygon): Position | null {
  const edges = polygon.flatMap((ring) =>
    ring.map((vertex, i): Edge => [vertex, ring[(i + 1) % ring.length] ?? vertex]),
  );
  const index = new Flatbush(edges.length);
  for (const [a, b] of edges)
    index.add(Math.min(a[0], b[0]), Math.min(a[1], b[1]), Math.max(a[0], b[0]), Math.max(a[1], b[1]));
  index.finish();
  for (const [i, edge] of edges.entries()) {
    const [a, b] = edge;
    const near = index.search(
      Math.min(a[0], b[0]),
      Math.min(a[1], b[1]),
      Math.max(a[0], b[0]),
      Math.max(a[1], b[1]),
      (j) => j > i,
    );
    for (const j of near) {
      const other = edges[j];
      if (other !== undefined && crossProperly(edge, other)) return meeting(edge, other);
    }
  }
  return null;
}

function crossProperly([a, b]: Edge, [c, d]: Edge): boolean {
  const sideC = orient2d(a[0], a[1], b[0], b[1], c[0], c[1]);
  const sideD = orient2d(a[0], a[1], b[0], b[1], d[0], d[1]);
  if (!opposite(sideC, sideD)) return false;
  return opposite(orient2d(c[0], c[1], d[0], d[1], a[0], a[1]), orient2d(c[0], c[1], d[0], d[1], b[0], b[1]));
}

const opposite = (a: number, b: number): boolean => (a > 0 && b < 0) || (a < 0 && b > 0);

function meeting([a, b]: Edge, [c, d]: Edge): Position {
  const [abX, abY, cdX, cdY] = [b[0] - a[0], b[1] - a[1], d[0] - c[0], d[1] - c[1]];
  const t = ((c[0] - a[0]) * cdY - (c[1] - a[1]) * cdX) / (abX * cdY - abY * cdX);
  return [a[0] + t * abX, a[1] + t * abY];
}
