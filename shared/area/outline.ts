import type { ImportedArea } from "#shared/area/imported-area.ts";
import { onTheGlobe } from "#shared/area/world.ts";
import type { Position } from "#shared/projection/transformer.ts";

/** More vertices than this are thinned out for the map; nothing is ever computed from an outline. */
const MANY_VERTICES = 20_000;
/** Thinning departs from the boundary by at most this share of the area's extent: well below a pixel when all is in view. */
const THINNING_SHARE = 1 / 8000;

export interface Outline {
  /** [polygon][ring][vertex][lng, lat] in WGS 84 degrees, rings not closed. */
  readonly polygons: [number, number][][][];
  readonly simplified: boolean;
}

/** The area for display on a map. */
export function outlineForMap(area: ImportedArea): Outline {
  const { polygons, bounds } = onTheGlobe(area);
  const vertices = polygons.flat().reduce((sum, ring) => sum + ring.length, 0);
  const simplified = vertices > MANY_VERTICES;
  const tolerance = Math.max(bounds[2] - bounds[0], bounds[3] - bounds[1]) * THINNING_SHARE;
  const show = (ring: readonly Position[]): [number, number][] =>
    (simplified ? thin(ring, tolerance) : ring).map(([lng, lat]) => [lng, lat]);
  return { polygons: polygons.map((polygon) => polygon.map(show)), simplified };
}

/** Douglas and Peucker's thinning of a ring, from its first vertex and the one farthest from it; at least three vertices stay. */
function thin(ring: readonly Position[], tolerance: number): readonly Position[] {
  const keep = new Uint8Array(ring.length);
  const far = farthest(ring, 0, 0, ring.length).index;
  keep[0] = 1;
  keep[far] = 1;
  const open: [number, number][] = [
    [0, far],
    [far, ring.length],
  ];
  for (let piece = open.pop(); piece !== undefined; piece = open.pop()) {
    const [from, to] = piece;
    const { index, distance } = farthest(ring, from, to % ring.length, to);
    if (distance <= tolerance) continue;
    keep[index] = 1;
    open.push([from, index], [index, to]);
  }
  const kept = ring.filter((_, i) => keep[i] === 1);
  return kept.length >= 3 ? kept : ring.slice(0, 3);
}

/** The vertex between two places of the ring that lies farthest from the straight line between `from` and `end`. */
function farthest(
  ring: readonly Position[],
  from: number,
  end: number,
  to: number,
): { index: number; distance: number } {
  const [a, b] = [ring[from] ?? [0, 0], ring[end] ?? [0, 0]];
  const [dx, dy] = [b[0] - a[0], b[1] - a[1]];
  const length = dx * dx + dy * dy;
  let best = { index: from, distance: -1 };
  for (let i = from + 1; i < to; i++) {
    const [x, y] = ring[i] ?? a;
    const along = length === 0 ? 0 : Math.min(1, Math.max(0, ((x - a[0]) * dx + (y - a[1]) * dy) / length));
    const distance = Math.hypot(x - a[0] - along * dx, y - a[1] - along * dy);
    if (distance > best.distance) best = { index: i, distance };
  }
  return best;
}
