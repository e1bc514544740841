import Flatbush from "flatbush";
import { twiceSignedArea } from "#shared/area/group-rings.ts";
import type { ImportedArea, SourcePolygon } from "#shared/area/imported-area.ts";
import { hasCorners, projectedRings } from "#shared/area/plane.ts";
import { extentOf } from "#shared/area/plausible.ts";
import { nodeRings } from "#shared/geometry/noding.ts";
import { areaOf } from "#shared/geometry/rings.ts";
import type { Ring } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import type { Crs } from "#shared/projection/crs.ts";
import type { Bounds } from "#shared/projection/suggest.ts";
import type { Position } from "#shared/projection/transformer.ts";
import { squareMetres, type SquareMetres } from "#shared/units/metric.ts";

const MM2_PER_M2 = 1e6;
/** Borders that two polygons share may be digitised twice; overlaps narrower than this along all edges are rounding. */
const ROUNDING_METRES = 0.002;
/** The first look takes edges to within 5 cm only, which is three times faster; what it finds is looked at closely. */
const FIRST_LOOK_METRES = 0.05;
/** Pairs looked at to name the two polygons that overlap; beyond it only the area is told. */
const MAX_PAIRS = 2000;

/**
 * Makes sure that no ground is counted twice and no hole lies outside its polygon: the sum of the polygons (outer less holes)
 * equals the area that is covered an odd number of times, found exactly by noding on a true-area plane around the place.
 * @throws Problem parts-overlap with the doubled m², rings-cross for holes outside, overlapping holes and rings through themselves.
 */
export function checkOverlaps(area: ImportedArea, bounds: Bounds): void {
  const plane = equalAreaPlane(bounds);
  if (isRounding(surplusOf(area, plane, FIRST_LOOK_METRES))) return;
  const surplus = surplusOf(area, plane);
  if (isRounding(surplus)) return;
  area.polygons.forEach((polygon, index) => {
    const own = surplusOf({ crs: area.crs, polygons: [polygon] }, plane);
    if (!isRounding(own)) throw brokenPolygon(index + 1, area.polygons.length, own.m2);
  });
  const pair = overlappingPair(area, plane);
  const doubled = format(surplus.m2 / 2);
  const which = pair === null ? "Parts of the area" : `Polygons ${pair[0] + 1} and ${pair[1] + 1}`;
  throw new Problem(
    "parts-overlap",
    `${which} overlap: ${doubled} m² in all would be counted twice or left out. Join overlapping polygons (union, dissolve) and import the result.`,
  );
}

interface Surplus {
  /** Sum of the polygons less what is covered an odd number of times. */
  readonly m2: SquareMetres;
  readonly perimeterMetres: number;
}

const isRounding = ({ m2, perimeterMetres }: Surplus): boolean => Math.abs(m2) <= ROUNDING_METRES * perimeterMetres;

function surplusOf(area: ImportedArea, plane: Crs, maxDeparture?: number): Surplus {
  const { rings } = projectedRings(area, plane, undefined, maxDeparture);
  let sum = 0;
  let perimeterMetres = 0;
  let next = 0;
  for (const polygon of area.polygons) {
    polygon.forEach((_, index) => {
      const ring = positions(rings[next] ?? []);
      next += 1;
      sum += (index === 0 ? 1 : -1) * Math.abs(twiceSignedArea(ring));
      perimeterMetres += lengthOf(ring) / 1000;
    });
  }
  const odd = Number(areaOf(nodeRings(rings.filter(hasCorners))).twiceMm2);
  return { m2: squareMetres((sum - odd) / 2 / MM2_PER_M2), perimeterMetres };
}

function brokenPolygon(number: number, of: number, surplus: number): Problem {
  const which = of === 1 ? "The polygon" : `Polygon ${number}`;
  const how =
    surplus < 0
      ? "has a hole that lies outside it or overlaps another hole, or its boundary runs through itself at a corner"
      : "covers the same ground twice";
  return new Problem(
    "rings-cross",
    `${which} ${how} (${format(Math.abs(surplus) / 2)} m² are in doubt). Repair its geometry and import the result.`,
  );
}

/** The first two polygons, in the order of the file, that cover ground together. */
function overlappingPair(area: ImportedArea, plane: Crs): readonly [number, number] | null {
  const index = new Flatbush(area.polygons.length);
  const extents = area.polygons.map((polygon) => extentOf([polygon]));
  for (const { west, south, east, north } of extents) index.add(west, south, east, north);
  index.finish();
  let looked = 0;
  for (const [i, { west, south, east, north }] of extents.entries()) {
    for (const j of index.search(west, south, east, north, (other) => other > i).sort((a, b) => a - b)) {
      looked += 1;
      if (looked > MAX_PAIRS) return null;
      const polygons = [area.polygons[i], area.polygons[j]].filter(
        (polygon): polygon is SourcePolygon => polygon !== undefined,
      );
      if (!isRounding(surplusOf({ crs: area.crs, polygons }, plane))) return [i, j];
    }
  }
  return null;
}

/** Lambert's azimuthal equal-area projection about the middle: areas are true, and any place has one. */
function equalAreaPlane([west, south, east, north]: Bounds): Crs {
  const text = `+proj=laea +lat_0=${(south + north) / 2} +lon_0=${(west + east) / 2} +x_0=0 +y_0=0 +datum=WGS84 +units=m +no_defs`;
  return { text, epsg: null, name: "an equal-area plane", kind: "projected", metresPerUnit: 1, note: null };
}

const positions = (ring: Ring): Position[] =>
  Array.from({ length: ring.length / 2 }, (_, i) => [ring[2 * i] ?? 0, ring[2 * i + 1] ?? 0]);

function lengthOf(ring: readonly Position[]): number {
  let length = 0;
  let last = ring.at(-1) ?? [0, 0];
  for (const point of ring) {
    length += Math.hypot(point[0] - last[0], point[1] - last[1]);
    last = point;
  }
  return length;
}

const format = (m2: number): string => (m2 >= 100 ? Math.round(m2).toLocaleString("en-GB") : m2.toPrecision(3));
