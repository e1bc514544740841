import proj4 from "proj4";
import { Problem } from "#shared/problem.ts";
import { crsFromEpsg, type Crs } from "#shared/projection/crs.ts";

/** East and north in a projected system's unit, or longitude and latitude in degrees. Always in this order. */
export type Position = readonly [number, number];

export interface Transformer {
  readonly forward: (position: Position) => Position;
  readonly inverse: (position: Position) => Position;
}

export const WGS84: Crs = crsFromEpsg(4326);

/**
 * Converts positions between two systems; equal texts leave them untouched.
 * @throws Problem crs-unsupported (from the functions) for a place that the target system cannot show.
 */
export function transformer(from: Crs, to: Crs): Transformer {
  if (from.text === to.text) return { forward: (position) => position, inverse: (position) => position };
  const converter = proj4(from.text, to.text);
  return {
    forward: (position) =>
      finite(
        attempt(() => converter.forward([position[0], position[1]])),
        position,
        from,
        to,
      ),
    inverse: (position) =>
      finite(
        attempt(() => converter.inverse([position[0], position[1]])),
        position,
        to,
        from,
      ),
  };
}

/** Positions of a system as WGS 84 longitude and latitude in degrees. */
export const toWgs84 = (crs: Crs): ((position: Position) => Position) => transformer(crs, WGS84).forward;

function attempt(convert: () => number[]): readonly number[] {
  try {
    return convert();
  } catch {
    return [];
  }
}

function finite(result: readonly number[], position: Position, from: Crs, to: Crs): Position {
  const [x, y] = result;
  if (x === undefined || y === undefined || !Number.isFinite(x) || !Number.isFinite(y)) {
    throw new Problem(
      "crs-unsupported",
      `The place ${position[0]}, ${position[1]} of ${from.name} cannot be shown in ${to.name}. Check that the system is the right one for this place.`,
    );
  }
  return [x, y];
}
