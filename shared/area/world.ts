import type { ImportedArea } from "#shared/area/imported-area.ts";
import { checkComesHome } from "#shared/area/scale.ts";
import { Problem } from "#shared/problem.ts";
import type { Bounds } from "#shared/projection/suggest.ts";
import { transformer, WGS84, type Position } from "#shared/projection/transformer.ts";

export interface AreaOnTheGlobe {
  /** [polygon][ring][vertex] in WGS 84 longitude and latitude, rings not closed. */
  readonly polygons: readonly (readonly (readonly Position[])[])[];
  readonly bounds: Bounds;
}

/**
 * The area's vertices as longitude and latitude of WGS 84, with their bounds.
 * @throws Problem area-size when the area crosses 180° or holds a pole, where longitudes jump; crs-unsupported when its system cannot show the place.
 */
export function onTheGlobe(area: ImportedArea): AreaOnTheGlobe {
  const conversion = transformer(area.crs, WGS84);
  for (const ring of area.polygons.flat())
    if (ring[0] !== undefined) checkComesHome(conversion, ring[0], area.crs, WGS84);
  const convert = conversion.forward;
  const polygons = area.polygons.map((polygon) => polygon.map((ring) => ring.map(convert)));
  let [west, south, east, north] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const ring of polygons.flat()) {
    let last = ring.at(-1);
    for (const point of ring) {
      if (last !== undefined && Math.abs(point[0] - last[0]) > 180) throw acrossTheLine();
      west = Math.min(west, point[0]);
      east = Math.max(east, point[0]);
      south = Math.min(south, point[1]);
      north = Math.max(north, point[1]);
      last = point;
    }
  }
  if (east - west > 180) throw acrossTheLine();
  return { polygons, bounds: [west, south, east, north] };
}

const acrossTheLine = (): Problem =>
  new Problem(
    "area-size",
    "The area crosses longitude 180° or holds a pole, which cannot be read yet. Split it at 180° and make a survey of each side.",
  );
