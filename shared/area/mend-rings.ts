import { twiceSignedArea } from "#shared/area/group-rings.ts";
import type { SourcePolygon, SourceRing } from "#shared/area/imported-area.ts";
import { distanceToEdge, metresPerUnitAt } from "#shared/area/scale.ts";
import type { Crs } from "#shared/projection/crs.ts";
import type { Position } from "#shared/projection/transformer.ts";

/** A spike narrower than this is an accident of digitising: 1 mm. */
const SPIKE_METRES = 0.001;

interface Tally {
  closed: number;
  duplicates: number;
  spikes: number;
  dropped: number;
  turned: number;
}

export interface MendedRings {
  readonly polygons: readonly SourcePolygon[];
  readonly mended: readonly string[];
}

/**
 * Mends what changes nothing on the ground, and tells it: closes open rings with a straight edge, takes out vertices that repeat
 * the one before and spikes narrower than 1 mm, leaves rings without three corners aside, and turns outer rings counter-clockwise
 * and holes clockwise.
 */
export function mendRings(polygons: readonly (readonly (readonly Position[])[])[], crs: Crs): MendedRings {
  const tally: Tally = { closed: 0, duplicates: 0, spikes: 0, dropped: 0, turned: 0 };
  const kept: SourcePolygon[] = [];
  for (const polygon of polygons) {
    const rings: SourceRing[] = [];
    polygon.forEach((ring, index) => {
      const mended = mendRing(ring, crs, tally);
      if (mended === null) {
        tally.dropped += index === 0 ? polygon.length : 1;
      } else if (index === 0 || rings.length > 0) {
        rings.push(turn(mended, index === 0, tally));
      }
    });
    if (rings.length > 0) kept.push(rings);
  }
  return { polygons: kept, mended: inWords(tally) };
}

function mendRing(ring: readonly Position[], crs: Crs, tally: Tally): SourceRing | null {
  const [first, last] = [ring[0], ring.at(-1)];
  if (first === undefined || last === undefined) return null;
  const open = ring.length > 1 && !same(first, last);
  const body = open ? ring : ring.slice(0, -1);
  const distinct = body.filter((vertex, i) => i === 0 || !same(vertex, body[i - 1] ?? vertex));
  const { ring: smooth, spikes } = withoutSpikes(distinct, crs);
  if (smooth.length < 3) return null;
  tally.closed += open ? 1 : 0;
  tally.duplicates += body.length - distinct.length;
  tally.spikes += spikes;
  return smooth;
}

/** A vertex is the tip of a spike when the ring turns back there along the edge that it came by, to within 1 mm. */
function withoutSpikes(ring: readonly Position[], crs: Crs): { ring: readonly Position[]; spikes: number } {
  const kept: Position[] = [];
  let spikes = 0;
  for (const next of ring) {
    while (isSpike(kept.at(-2), kept.at(-1), next, crs)) {
      kept.pop();
      spikes += 1;
    }
    const tip = kept.at(-1);
    if (tip === undefined || !same(tip, next)) kept.push(next);
  }
  // The same where the ring closes.
  for (let looking = true; looking && kept.length >= 3;) {
    looking = false;
    if (isSpike(kept.at(-2), kept.at(-1), kept[0], crs)) {
      kept.pop();
      looking = true;
    } else if (isSpike(kept.at(-1), kept[0], kept[1], crs)) {
      kept.shift();
      looking = true;
    }
    if (looking) spikes += 1;
    if (kept.length >= 2 && same(kept[0] ?? [0, 0], kept.at(-1) ?? [0, 0])) kept.pop();
  }
  return { ring: kept, spikes };
}

function isSpike(
  before: Position | undefined,
  tip: Position | undefined,
  after: Position | undefined,
  crs: Crs,
): boolean {
  if (before === undefined || tip === undefined || after === undefined) return false;
  const scale = metresPerUnitAt(crs, tip);
  const inX = (tip[0] - before[0]) * (after[0] - tip[0]) * scale[0] * scale[0];
  const inY = (tip[1] - before[1]) * (after[1] - tip[1]) * scale[1] * scale[1];
  if (inX + inY >= 0) return false;
  return (
    distanceToEdge(after, before, tip, scale).metres < SPIKE_METRES ||
    distanceToEdge(before, tip, after, scale).metres < SPIKE_METRES
  );
}

function turn(ring: SourceRing, outer: boolean, tally: Tally): SourceRing {
  const size = twiceSignedArea(ring);
  if (size === 0 || size > 0 === outer) return ring;
  tally.turned += 1;
  return ring.toReversed();
}

function inWords({ closed, duplicates, spikes, dropped, turned }: Tally): string[] {
  const told: string[] = [];
  if (closed > 0) told.push(`${count(closed, "ring was open", "rings were open")}; closed with a straight edge.`);
  if (duplicates > 0) told.push(`${count(duplicates, "vertex", "vertices")} repeated the one before; taken out.`);
  if (spikes > 0) told.push(`${count(spikes, "spike", "spikes")} narrower than 1 mm taken out.`);
  if (dropped > 0) told.push(`${count(dropped, "ring", "rings")} without an area left aside.`);
  if (turned > 0)
    told.push(`${count(turned, "ring", "rings")} ran the other way round; turned, which changes nothing.`);
  return told;
}

const count = (n: number, one: string, many: string): string => `${n} ${n === 1 ? one : many}`;
const same = (a: Position, b: Position): boolean => a[0] === b[0] && a[1] === b[1];
