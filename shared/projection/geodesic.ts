import type { Position } from "#shared/projection/transformer.ts";
import { squareMetres, type SquareMetres } from "#shared/units/metric.ts";

const MAJOR_AXIS = 6_378_137;
const FLATTENING = 1 / 298.257_223_563;
const MINOR_AXIS = MAJOR_AXIS * (1 - FLATTENING);
/** First eccentricity squared, and its root. */
export const ECCENTRICITY_SQUARED = FLATTENING * (2 - FLATTENING);
const ECCENTRICITY = Math.sqrt(ECCENTRICITY_SQUARED);
const RADIANS = Math.PI / 180;
const MAX_HALVINGS = 12;

/** Degrees along an edge: t = 0 at its first vertex, 1 at its last. */
export type EdgePath = (t: number) => Position;

/**
 * Area between the equator and a latitude, for each radian of longitude, on the WGS 84 ellipsoid:
 * b²/2 · (sin φ / (1 − e² sin² φ) + artanh(e sin φ) / e), in m². This is what "authalic latitude" is made from.
 * Source: J. P. Snyder, Map Projections: A Working Manual (1987), equation 3-12; C. F. F. Karney, Algorithms for geodesics (2013), §6.
 */
function areaFromEquator(latitude: number): number {
  const sine = Math.sin(latitude * RADIANS);
  return (
    ((MINOR_AXIS * MINOR_AXIS) / 2) *
    (sine / (1 - ECCENTRICITY_SQUARED * sine * sine) + Math.atanh(ECCENTRICITY * sine) / ECCENTRICITY)
  );
}

/**
 * Area between an edge and the equator in m², positive eastward: the integral of `areaFromEquator` over longitude along the
 * edge, by the trapezium rule on 1, 2, 4 … pieces with Romberg's extrapolation, until it stands still. So the edge is taken as
 * it truly runs (straight in its own system), and no vertices need to be added.
 */
export function areaUnderEdge(path: EdgePath): number {
  let points: Position[] = [path(0), path(1)];
  let previous = [trapezia(points)];
  for (let halving = 1; halving <= MAX_HALVINGS; halving++) {
    points = refine(points, path);
    const row = [trapezia(points)];
    for (let order = 1; order <= halving; order++) {
      const [fine, coarse] = [row[order - 1] ?? 0, previous[order - 1] ?? 0];
      row.push(fine + (fine - coarse) / (4 ** order - 1));
    }
    const best = row.at(-1) ?? 0;
    if (Math.abs(best - (previous.at(-1) ?? 0)) <= 1e-6 + 1e-13 * Math.abs(best)) return best;
    previous = row;
  }
  return previous.at(-1) ?? 0;
}

/** Area of a closed ring of edges on the ellipsoid, in m²; positive when counter-clockwise. The ring may not hold a pole. */
export function areaOnEllipsoid(edges: Iterable<EdgePath>): SquareMetres {
  let sum = 0;
  for (const edge of edges) sum -= areaUnderEdge(edge);
  return squareMetres(sum);
}

/** Area element of the ellipsoid at a latitude: m² for each square degree of longitude and latitude. */
export function squareDegree(latitude: number): SquareMetres {
  const sine = Math.sin(latitude * RADIANS);
  const factor = 1 - ECCENTRICITY_SQUARED * sine * sine;
  return squareMetres(
    ((MINOR_AXIS * MINOR_AXIS * Math.cos(latitude * RADIANS)) / (factor * factor)) * RADIANS * RADIANS,
  );
}

/** Metres for each degree of longitude and of latitude at a latitude. */
export function metresPerDegree(latitude: number): { readonly lng: number; readonly lat: number } {
  const sine = Math.sin(latitude * RADIANS);
  const factor = 1 - ECCENTRICITY_SQUARED * sine * sine;
  const primeVertical = MAJOR_AXIS / Math.sqrt(factor);
  return {
    lng: primeVertical * Math.cos(latitude * RADIANS) * RADIANS,
    lat: ((primeVertical * (1 - ECCENTRICITY_SQUARED)) / factor) * RADIANS,
  };
}

function trapezia(points: readonly Position[]): number {
  let sum = 0;
  let last = points[0];
  for (const point of points) {
    if (last !== undefined && point !== last) {
      sum += ((areaFromEquator(last[1]) + areaFromEquator(point[1])) / 2) * (point[0] - last[0]) * RADIANS;
    }
    last = point;
  }
  return sum;
}

function refine(points: readonly Position[], path: EdgePath): Position[] {
  const pieces = points.length - 1;
  return Array.from(
    { length: 2 * pieces + 1 },
    (_, i) => (i % 2 === 0 ? points[i / 2] : undefined) ?? path(i / (2 * pieces)),
  );
}
