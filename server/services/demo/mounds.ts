import { createHash } from "node:crypto";
import type { LngLat } from "#shared/units/metric.ts";
import { HEATH_MIDDLE, METRES_PER_DEGREE } from "./heath.ts";

/** Where mounds stand close together: metres from the middle of the heath, how many a cell, and how far it reaches. */
const CLUMPS = [
  { east: -150, north: 140, mounds: 9, reach: 60 },
  { east: 60, north: -120, mounds: 7, reach: 75 },
  { east: 200, north: -60, mounds: 5, reach: 45 },
  { east: -40, north: 200, mounds: 6, reach: 50 },
] as const;

/**
 * How many mounds a cell of the made-up heath holds: thick in a few places, few elsewhere, and many cells with none.
 * Always the same for the same cell.
 */
export function moundsAt(unit: number, place: LngLat, share: number): number {
  const east = (place.lng - HEATH_MIDDLE.lng) * METRES_PER_DEGREE.east;
  const north = (place.lat - HEATH_MIDDLE.lat) * METRES_PER_DEGREE.north;
  const expected = CLUMPS.reduce(
    (sum, clump) =>
      sum + clump.mounds * Math.exp(-(((east - clump.east) ** 2 + (north - clump.north) ** 2) / clump.reach ** 2)),
    0.35,
  );
  return poisson(expected * share * 2 * fraction(`clumping ${unit}`), fraction(`mounds ${unit}`));
}

/** A number between 0 and 1 that belongs to a text. */
function fraction(text: string): number {
  return createHash("sha256").update(text).digest().readUInt32BE(0) / 2 ** 32;
}

/** The Poisson quantile: the smallest count whose cumulated chance reaches `chance`. */
function poisson(mean: number, chance: number): number {
  let term = Math.exp(-mean);
  let sum = term;
  let count = 0;
  while (sum < chance && count < 200) {
    count += 1;
    term *= mean / count;
    sum += term;
  }
  return count;
}
