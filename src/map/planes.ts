import type { LngLat } from "#shared/units/metric.ts";
import { boundsOfPolygons, type PlaneBounds, type PlanePolygons } from "./sheet-geometry.ts";

/** From plane metres to WGS 84, for the graticule and for places under the pointer; good for drawing, never for data. */
export type LngLatOf = (east: number, north: number) => LngLat;

const METRES_PER_DEGREE = 111_195;

/** A plane of its own for an area that has no projected CRS yet. */
export interface LocalPlane {
  readonly polygons: PlanePolygons;
  readonly bounds: PlaneBounds;
  readonly lngLatOf: LngLatOf;
  readonly planeOf: (place: LngLat) => { east: number; north: number };
}

/**
 * Degrees as an equirectangular plane around the middle of the outline: metres east = longitude · cos(middle latitude) · 111 195, metres
 * north = latitude · 111 195. For looking only. Throws RangeError where there is no vertex.
 */
export function localPlane(outlineInDegrees: PlanePolygons): LocalPlane {
  const degrees = boundsOfPolygons(outlineInDegrees);
  const middle = ((degrees.south + degrees.north) / 2) * 1000;
  const perLng = METRES_PER_DEGREE * Math.max(0.01, Math.cos((middle * Math.PI) / 180));
  const polygons = outlineInDegrees.map((polygon) =>
    polygon.map((ring) =>
      ring.map(([lng, lat]): readonly [number, number] => [lng * perLng * 1000, lat * METRES_PER_DEGREE * 1000]),
    ),
  );
  return {
    polygons,
    bounds: boundsOfPolygons(polygons),
    lngLatOf: (east, north) => ({ lng: east / perLng, lat: north / METRES_PER_DEGREE }),
    planeOf: ({ lng, lat }) => ({ east: lng * perLng, north: lat * METRES_PER_DEGREE }),
  };
}

/**
 * Longitude and latitude as the polynomial of second degree in east and north through a net of 3 × 3 points [east, north, lng, lat]
 * (east and north each take three different values). Across one study area that is good to well below a second of arc.
 * Throws RangeError for any other net.
 */
export function lngLatFromNet(net: readonly (readonly [number, number, number, number])[]): LngLatOf {
  const easts = [...new Set(net.map(([east]) => east))].sort((a, b) => a - b);
  const norths = [...new Set(net.map(([, north]) => north))].sort((a, b) => a - b);
  if (net.length !== 9 || easts.length !== 3 || norths.length !== 3)
    throw new RangeError(`needs a net of 3 × 3 points, got ${net.length} on ${easts.length} × ${norths.length}`);
  return (east, north) => {
    const acrossEast = weights(easts, east);
    const acrossNorth = weights(norths, north);
    let lng = 0;
    let lat = 0;
    for (const [pointEast, pointNorth, pointLng, pointLat] of net) {
      const weight = (acrossEast[easts.indexOf(pointEast)] ?? 0) * (acrossNorth[norths.indexOf(pointNorth)] ?? 0);
      lng += weight * pointLng;
      lat += weight * pointLat;
    }
    return { lng, lat };
  };
}

/** Lagrange weights of three places at x. */
function weights(places: readonly number[], x: number): number[] {
  return places.map((place, i) =>
    places.reduce((product, other, j) => (i === j ? product : (product * (x - other)) / (place - other)), 1),
  );
}
