import { CornerNumbers } from "./corner-numbers.ts";
import type { EdgeIndex } from "./edge-index.ts";
import type { EdgeSet } from "./edge-set.ts";
import { visitCrossedWest } from "./ray.ts";
import { turn } from "./turn.ts";

/** A simple ring with the inside on its left, and one of its edges that is not level. */
export interface TracedRing {
  readonly ring: readonly number[];
  readonly edge: number;
}

export interface Traced {
  readonly rings: TracedRing[];
  /** The ring that each edge belongs to. */
  readonly ringOf: Int32Array;
}

/**
 * Half-edges: 2k runs along edge k, 2k + 1 back; at each corner the ones that leave it, counter-clockwise.
 */
interface HalfEdges {
  /** The corner that a half-edge leaves. */
  readonly origin: Int32Array;
  /** The half-edges that leave a corner stand at around[start[corner]] … around[start[corner + 1] − 1]. */
  readonly start: Int32Array;
  readonly around: Int32Array;
  /** Place of a half-edge in `around`. */
  readonly place: Int32Array;
}

const upperHalf = (x: number, y: number): boolean => y > 0 || (y === 0 && x > 0);

function halfEdgesOf({ count, ends }: EdgeSet): HalfEdges {
  const corners = new CornerNumbers(2 * count);
  const origin = new Int32Array(2 * count);
  for (let half = 0; half < 2 * count; half += 1) {
    origin[half] = corners.numberOf(ends[2 * half] ?? 0, ends[2 * half + 1] ?? 0);
  }
  const start = new Int32Array(corners.count + 1);
  for (const corner of origin) start[corner + 1] = (start[corner + 1] ?? 0) + 1;
  for (let corner = 0; corner < corners.count; corner += 1)
    start[corner + 1] = (start[corner + 1] ?? 0) + (start[corner] ?? 0);
  const around = new Int32Array(2 * count);
  const filled = start.slice();
  origin.forEach((corner, half) => {
    around[filled[corner] ?? 0] = half;
    filled[corner] = (filled[corner] ?? 0) + 1;
  });
  for (let corner = 0; corner < corners.count; corner += 1) {
    const from = start[corner] ?? 0;
    const to = start[corner + 1] ?? 0;
    if (to - from > 2) around.subarray(from, to).sort((a, b) => compareDirections(ends, a, b));
  }
  const place = new Int32Array(2 * count);
  around.forEach((half, at) => (place[half] = at));
  return { origin, start, around, place };
}

/** Counter-clockwise from due east, of two half-edges that leave one corner. */
function compareDirections(ends: Float64Array, a: number, b: number): number {
  const [x, y] = [ends[2 * a] ?? 0, ends[2 * a + 1] ?? 0];
  const [ax, ay] = [(ends[2 * (a ^ 1)] ?? 0) - x, (ends[2 * (a ^ 1) + 1] ?? 0) - y];
  const [bx, by] = [(ends[2 * (b ^ 1)] ?? 0) - x, (ends[2 * (b ^ 1) + 1] ?? 0) - y];
  const aUpper = upperHalf(ax, ay);
  if (aUpper !== upperHalf(bx, by)) return aUpper ? -1 : 1;
  return -turn(0, 0, ax, ay, bx, by);
}

/**
 * Rings around the inside of edges that meet at their ends only and of which no two are equal. Inside is where a ray crosses an odd number
 * of edges. A walk keeps the inside on its left and at each corner takes the next edge clockwise from where it came, so it never
 * crosses itself; where it comes by a corner twice it is cut into rings that are simple.
 */
export function traceRings(edges: EdgeSet, index: EdgeIndex): Traced {
  const { count, ends } = edges;
  const halves = halfEdgesOf(edges);
  const done = new Uint8Array(count);
  const onWay = new Int32Array(halves.start.length).fill(-1);
  const traced: Traced = { rings: [], ringOf: new Int32Array(count) };
  for (let edge = 0; edge < count; edge += 1) {
    const isLevel = ends[4 * edge + 1] === ends[4 * edge + 3];
    if (done[edge] === 1 || isLevel) continue;
    let crossed = 0;
    visitCrossedWest(ends, index, edge, () => (crossed += 1));
    const insideIsWest = crossed % 2 === 1;
    const rises = (ends[4 * edge + 3] ?? 0) > (ends[4 * edge + 1] ?? 0);
    // Heading north has the west on its left.
    const firstHalf = 2 * edge + (rises === insideIsWest ? 0 : 1);
    walk(firstHalf, ends, halves, done, onWay, traced);
  }
  return traced;
}

function walk(
  firstHalf: number,
  ends: Float64Array,
  halves: HalfEdges,
  done: Uint8Array,
  onWay: Int32Array,
  traced: Traced,
): void {
  const { origin, start, around, place } = halves;
  const way: number[] = [];
  let half = firstHalf;
  do {
    const corner = origin[half] ?? 0;
    const met = onWay[corner] ?? -1;
    if (met >= 0) closeRing(way.splice(met), ends, origin, onWay, traced);
    onWay[corner] = way.length;
    way.push(half);
    done[half >> 1] = 1;
    const back = half ^ 1;
    const next = origin[back] ?? 0;
    const at = place[back] ?? 0;
    half = around[at === start[next] ? (start[next + 1] ?? 0) - 1 : at - 1] ?? 0;
  } while (half !== firstHalf);
  closeRing(way, ends, origin, onWay, traced);
}

function closeRing(
  way: readonly number[],
  ends: Float64Array,
  origin: Int32Array,
  onWay: Int32Array,
  { rings, ringOf }: Traced,
): void {
  const ring: number[] = [];
  let edge = -1;
  for (const half of way) {
    ring.push(ends[2 * half] ?? 0, ends[2 * half + 1] ?? 0);
    onWay[origin[half] ?? 0] = -1;
    ringOf[half >> 1] = rings.length;
    if (ends[2 * half + 1] !== ends[2 * (half ^ 1) + 1]) edge = half >> 1;
  }
  rings.push({ ring, edge });
}
