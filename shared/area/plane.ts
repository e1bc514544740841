import { ellipsoidArea } from "#shared/area/ellipsoid-area.ts";
import type { ImportedArea, SourceRing } from "#shared/area/imported-area.ts";
import { checkComesHome } from "#shared/area/scale.ts";
import { splitAtTouchingVertices } from "#shared/area/touching.ts";
import { nodeRings } from "#shared/geometry/noding.ts";
import { areaOf, type PlaneArea, type Ring } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import { checkFrameCrs, type Crs } from "#shared/projection/crs.ts";
import { distortionInWords } from "#shared/projection/distortion.ts";
import { transformer, type Position } from "#shared/projection/transformer.ts";

/**
 * Rule R1 allows 5 mm between an edge and its true image. It is looked at in seven places of each piece, so the limit here is a
 * little smaller: a smooth curve departs by at most a few per cent more between the places.
 */
const MAX_DEPARTURE_METRES = 0.0045;
/** A piece this short that departs this little in its middle is smooth enough to need no further look: its bow is a parabola's. */
const SHORT_METRES = 2000;
const SMOOTH_METRES = 0.001;
/** Longer pieces are always halved, so that no curve hides between the places looked at. */
const MAX_PIECE_METRES = 20_000;
const MAX_DEPTH = 40;
const MM_PER_METRE = 1000;
const MM2_PER_M2 = 1_000_000;

export interface PlaneRingsMade {
  readonly area: PlaneArea;
  readonly notes: readonly string[];
}

/**
 * Rule R1: the area on a frame's plane. Edges are straight in the source system; each is projected with vertices added until no
 * piece departs from its true image by more than 5 mm, rounded half up to whole millimetres, and noded on the millimetre grid.
 * Made once and stored: sin and cos may differ between engines in the last place.
 * @param onProgress told the share done, 0 … 1, now and then; may throw to cancel.
 * @throws Problem crs-unsupported unless the frame's system is projected and in metres, area-size when nothing is left.
 */
export function makePlaneRings(
  area: ImportedArea,
  frameCrs: Crs,
  onProgress?: (share: number) => void,
): PlaneRingsMade {
  checkFrameCrs(frameCrs);
  const { rings, added } = projectedRings(area, frameCrs, onProgress);
  const noded = nodeRings(rings.filter(hasCorners));
  if (noded.polygons.length === 0) {
    throw new Problem(
      "area-size",
      `Nothing is left of the area on the plane of ${frameCrs.name}: it is narrower than a millimetre. Check the unit of the file.`,
    );
  }
  const notes =
    added === 0 ? [] : [`${added} vertices added, so that no edge departs from its true course by more than 5 mm.`];
  const scale = Number(areaOf(noded).twiceMm2) / 2 / MM2_PER_M2 / ellipsoidArea(area);
  notes.push(`On the plane of ${frameCrs.name} ${distortionInWords(scale)} here.`);
  if (frameCrs.note !== null) notes.push(frameCrs.note);
  return { area: noded, notes };
}

/**
 * The rings in whole millimetres before noding, one for each source ring, in the same order.
 * @param maxDeparture metres that a piece may depart from its true image; a frame's own limit unless given.
 */
export function projectedRings(
  area: ImportedArea,
  frameCrs: Crs,
  onProgress?: (share: number) => void,
  maxDeparture = MAX_DEPARTURE_METRES,
): { rings: Ring[]; added: number } {
  const conversion = transformer(area.crs, frameCrs);
  const { forward } = conversion;
  const sameSystem = area.crs.text === frameCrs.text;
  const source = splitAtTouchingVertices(area).flat();
  const before = area.polygons.flat().reduce((sum, ring) => sum + ring.length, 0);
  const total = source.reduce((sum, ring) => sum + ring.length, 0);
  let done = 0;
  let made = 0;
  const rings = source.map((ring) => {
    if (ring[0] !== undefined) checkComesHome(conversion, ring[0], area.crs, frameCrs);
    const plane = sameSystem ? ring.flat() : projectRing(ring, { forward, maxDeparture });
    done += ring.length;
    made += plane.length / 2;
    onProgress?.(done / total);
    return withoutRepeats(plane.map((value) => Math.floor(value * MM_PER_METRE + 0.5)));
  });
  return { rings, added: made - before };
}

interface Projection {
  readonly forward: (position: Position) => Position;
  readonly maxDeparture: number;
}

function projectRing(ring: SourceRing, projection: Projection): number[] {
  const images = ring.map(projection.forward);
  const flat: number[] = [];
  ring.forEach((from, i) => {
    const next = (i + 1) % ring.length;
    const [to, image, nextImage] = [ring[next], images[i], images[next]];
    if (to === undefined || image === undefined || nextImage === undefined)
      throw new RangeError(`ring without vertex ${next}`);
    flat.push(image[0], image[1]);
    flat.push(...verticesBetween(from, to, image, nextImage, projection));
  });
  return flat;
}

/**
 * Vertices to add on an edge, flat. An edge is always taken from its lower end (by x, then y), so that neighbours who share an
 * edge get the very same vertices whichever way each of them runs.
 */
function verticesBetween(
  from: Position,
  to: Position,
  fromImage: Position,
  toImage: Position,
  projection: Projection,
): number[] {
  if (to[0] < from[0] || (to[0] === from[0] && to[1] < from[1])) {
    const backwards = verticesBetween(to, from, toImage, fromImage, projection);
    return Array.from(
      { length: backwards.length },
      (_, i) => backwards[backwards.length - (i % 2 === 0 ? i + 2 : i)] ?? 0,
    );
  }
  const { forward, maxDeparture } = projection;
  const at = (t: number): Position => forward([from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])]);
  const flat: number[] = [];
  const halve = (start: number, end: number, startImage: Position, endImage: Position, depth: number): void => {
    const step = (end - start) / 8;
    const middle = at(start + 4 * step);
    const length = Math.hypot(endImage[0] - startImage[0], endImage[1] - startImage[1]);
    if (length <= SHORT_METRES && departure(middle, startImage, endImage) <= SMOOTH_METRES) return;
    const inside = [1, 2, 3]
      .map((k) => at(start + k * step))
      .concat(
        [middle],
        [5, 6, 7].map((k) => at(start + k * step)),
      );
    if (
      depth >= MAX_DEPTH ||
      (length <= MAX_PIECE_METRES && inside.every((point) => departure(point, startImage, endImage) <= maxDeparture))
    )
      return;
    halve(start, start + 4 * step, startImage, middle, depth + 1);
    flat.push(middle[0], middle[1]);
    halve(start + 4 * step, end, middle, endImage, depth + 1);
  };
  halve(0, 1, fromImage, toImage, 0);
  return flat;
}

/** Distance of a point from a straight piece, in metres. */
function departure(point: Position, from: Position, to: Position): number {
  const [dx, dy, px, py] = [to[0] - from[0], to[1] - from[1], point[0] - from[0], point[1] - from[1]];
  const length = dx * dx + dy * dy;
  const along = length === 0 ? 0 : Math.min(1, Math.max(0, (px * dx + py * dy) / length));
  return Math.hypot(px - along * dx, py - along * dy);
}

function withoutRepeats(ring: readonly number[]): Ring {
  const kept: number[] = [];
  for (let i = 0; i + 1 < ring.length; i += 2) {
    const [x, y] = [ring[i] ?? 0, ring[i + 1] ?? 0];
    if (x !== kept.at(-2) || y !== kept.at(-1)) kept.push(x, y);
  }
  while (kept.length > 2 && kept[0] === kept.at(-2) && kept[1] === kept.at(-1)) kept.splice(-2);
  return kept;
}

/** A ring that rounding has left fewer than three corners covers nothing. */
export const hasCorners = (ring: Ring): boolean => ring.length >= 6;
