import type { Position } from "#shared/projection/transformer.ts";

type Ring = readonly Position[];

/** Twice the signed area of a ring (closed or not) in the square of its coordinates' unit; positive counter-clockwise. */
export function twiceSignedArea(ring: Ring): number {
  const origin = ring[0] ?? [0, 0];
  let sum = 0;
  let last = ring.at(-1) ?? origin;
  for (const point of ring) {
    sum += (last[0] - origin[0]) * (point[1] - origin[1]) - (point[0] - origin[0]) * (last[1] - origin[1]);
    last = point;
  }
  return sum;
}

/** Whether a position lies inside a ring, even–odd and half-open; on an edge it may fall either way. */
export function contains(ring: Ring, [x, y]: Position): boolean {
  let inside = false;
  let last = ring.at(-1) ?? [0, 0];
  for (const point of ring) {
    if (last[1] <= y !== point[1] <= y && x < last[0] + ((y - last[1]) / (point[1] - last[1])) * (point[0] - last[0]))
      inside = !inside;
    last = point;
  }
  return inside;
}

/**
 * Gives each hole to the smallest outer ring that holds most of its vertices, since readers often look at bounding boxes only.
 * A hole that no outer ring holds stays where it was, and the checks name it.
 */
export function groupRings(polygons: readonly (readonly Ring[])[]): Position[][][] {
  const outers = polygons.flatMap(([outer]) =>
    outer === undefined ? [] : [{ outer, size: Math.abs(twiceSignedArea(outer)), holes: [] as Ring[] }],
  );
  if (outers.length === 1 || polygons.every((polygon) => polygon.length === 1))
    return polygons.map((polygon) => polygon.map((ring) => [...ring]));
  polygons.forEach((polygon, index) => {
    for (const hole of polygon.slice(1)) {
      const holding = outers.filter(
        ({ outer, size }) => size > Math.abs(twiceSignedArea(hole)) && holdsMost(outer, hole),
      );
      const smallest = holding.reduce<(typeof outers)[number] | undefined>(
        (best, next) => (best === undefined || next.size < best.size ? next : best),
        undefined,
      );
      (smallest ?? outers[index])?.holes.push(hole);
    }
  });
  return outers.map(({ outer, holes }) => [outer, ...holes].map((ring) => [...ring]));
}

const holdsMost = (outer: Ring, hole: Ring): boolean =>
  hole.filter((vertex) => contains(outer, vertex)).length * 2 > hole.length;
