import { askAxes, askCrs, type Magnitude } from "#shared/area/questions.ts";
import { Problem } from "#shared/problem.ts";
import type { Crs } from "#shared/projection/crs.ts";
import type { Position } from "#shared/projection/transformer.ts";

export interface Extent {
  readonly west: number;
  readonly south: number;
  readonly east: number;
  readonly north: number;
}

export function extentOf(polygons: readonly (readonly (readonly Position[])[])[]): Extent {
  let [west, south, east, north] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const polygon of polygons) {
    for (const ring of polygon) {
      for (const [x, y] of ring) {
        west = Math.min(west, x);
        east = Math.max(east, x);
        south = Math.min(south, y);
        north = Math.max(north, y);
      }
    }
  }
  return { west, south, east, north };
}

/** What bare numbers look like: degrees where all would be a longitude and a latitude, metres where they are far beyond that. */
export function magnitudeOf({ west, south, east, north }: Extent): Magnitude {
  if (west >= -180 && east <= 180 && south >= -90 && north <= 90) return "degrees";
  return Math.max(Math.abs(west), Math.abs(east), Math.abs(south), Math.abs(north)) > 400 ? "metres" : "unknown";
}

const inWords = ({ west, south, east, north }: Extent): string =>
  `${short(west)} to ${short(east)} in the first coordinate, ${short(south)} to ${short(north)} in the second`;
const short = (value: number): string => String(Number(value.toPrecision(8)));

/**
 * Whether the numbers can be what the system says. A system that the user gave in answer is held to the same.
 * @throws Problem coordinates-swapped, or area-question when degrees look like metres or metres like degrees; nothing is guessed.
 */
export function checkPlausible(extent: Extent, crs: Crs): void {
  const looks = magnitudeOf(extent);
  if (crs.kind === "geographic") {
    if (looks === "degrees") return;
    const { west, south, east, north } = extent;
    if (south >= -180 && north <= 180 && west >= -90 && east <= 90) {
      const why = `The second coordinate runs from ${short(south)} to ${short(north)}, which is no latitude, while exchanged the two would be longitude and latitude.`;
      throw askAxes(why, null, { lng: (south + north) / 2, lat: (west + east) / 2 });
    }
    if (looks === "unknown" && south >= -90 && north <= 90) {
      throw new Problem(
        "area-question",
        `Longitudes run from ${short(west)} to ${short(east)}, past 180°. Write the file again with longitudes from −180 to 180; areas that cross 180° are not read.`,
      );
    }
    throw askCrs(
      `The numbers look like metres, not degrees (${inWords(extent)}), but ${crs.name} is in degrees. Which grid and zone is it?`,
      "metres",
    );
  }
  // In metres a whole area within 180 × 90 units of the origin is possible, on a local grid, but in a system of the world it means degrees.
  if (looks === "degrees" && extent.east - extent.west < 20 && crs.metresPerUnit !== null && isFarFromOrigin(crs)) {
    throw askCrs(`The numbers look like degrees (${inWords(extent)}), but ${crs.name} is in metres.`, "degrees");
  }
}

/** Systems with a false origin, where no place of use has coordinates near 0, 0. */
const isFarFromOrigin = (crs: Crs): boolean =>
  /\+proj=utm\b|\+x_0=[1-9]\d{4,}|False_Easting"?\s*,\s*[1-9]\d{4,}/i.test(crs.text);
