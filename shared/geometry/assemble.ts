import type { EdgeIndex } from "./edge-index.ts";
import type { EdgeSet } from "./edge-set.ts";
import { visitCrossedWest } from "./ray.ts";
import { twiceSignedArea, type PlaneArea, type Ring } from "./rings.ts";
import { traceRings, type Traced } from "./trace.ts";

interface Outer {
  readonly ring: Ring;
  readonly twiceArea: bigint;
  readonly holes: Ring[];
}

/** Begins a ring at its corner furthest west (south of those): equal rings are equal lists then. */
function fromWest(ring: readonly number[]): Ring {
  let first = 0;
  for (let i = 2; i < ring.length; i += 2) {
    const difference = (ring[i] ?? 0) - (ring[first] ?? 0) || (ring[i + 1] ?? 0) - (ring[first + 1] ?? 0);
    if (difference < 0) first = i;
  }
  return [...ring.slice(first), ...ring.slice(0, first)];
}

function compareRings(a: Ring, b: Ring): number {
  for (let i = 0; i < a.length && i < b.length; i += 1) {
    const difference = (a[i] ?? 0) - (b[i] ?? 0);
    if (difference !== 0) return difference;
  }
  return a.length - b.length;
}

/**
 * The area inside noded edges, in the one form that it has: rings begin at their corner furthest west, outer rings run
 * counter-clockwise, holes clockwise, holes and polygons are sorted by their corners.
 */
export function assemble(edges: EdgeSet, index: EdgeIndex): PlaneArea {
  const traced = traceRings(edges, index);
  const outers = new Map<number, Outer>();
  traced.rings.forEach(({ ring }, number) => {
    const twiceArea = twiceSignedArea(ring);
    if (twiceArea > 0n) outers.set(number, { ring: fromWest(ring), twiceArea, holes: [] });
  });
  const only = outers.size === 1 ? [...outers.values()][0] : undefined;
  traced.rings.forEach(({ ring, edge }, number) => {
    if (outers.has(number)) return;
    const outer = only ?? innermostAround(edge, edges, index, traced, outers);
    outer.holes.push(fromWest(ring));
  });
  const polygons = [...outers.values()]
    .sort((a, b) => compareRings(a.ring, b.ring))
    .map(({ ring, holes }) => [ring, ...holes.sort(compareRings)]);
  return { polygons };
}

/** The smallest outer ring that a ray from an edge of a hole to the west crosses an odd number of times. */
function innermostAround(
  edge: number,
  { ends }: EdgeSet,
  index: EdgeIndex,
  { ringOf }: Traced,
  outers: ReadonlyMap<number, Outer>,
): Outer {
  const crossings = new Map<number, number>();
  visitCrossedWest(ends, index, edge, (crossed) => {
    const ring = ringOf[crossed] ?? 0;
    crossings.set(ring, (crossings.get(ring) ?? 0) + 1);
  });
  let innermost: Outer | undefined;
  for (const [ring, times] of crossings) {
    const outer = outers.get(ring);
    if (outer === undefined || times % 2 === 0) continue;
    if (innermost === undefined || outer.twiceArea < innermost.twiceArea) innermost = outer;
  }
  if (innermost === undefined) throw new RangeError(`no outer ring around the hole with edge ${edge}`);
  return innermost;
}
