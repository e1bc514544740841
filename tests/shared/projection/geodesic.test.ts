import { describe, expect, test } from "vitest";
import {
  areaOnEllipsoid,
  areaUnderEdge,
  ECCENTRICITY_SQUARED,
  metresPerDegree,
  squareDegree,
  type EdgePath,
} from "#shared/projection/geodesic.ts";
import { boundaryOf, geodesicAreas } from "./reference.ts";

const RADIANS = Math.PI / 180;

/**
 * A geodesic between two places less than a quarter of the globe apart, by the auxiliary sphere (Bessel 1825; Karney 2013, §2):
 * the spherical longitude is found by fixed-point iteration, with the integral of dλ/dω − 1 by Simpson's rule on 32 pieces.
 */
function geodesic([lng1, lat1]: readonly [number, number], [lng2, lat2]: readonly [number, number]): EdgePath {
  if (lng1 === lng2) return (t) => [lng1, lat1 + t * (lat2 - lat1)];
  const reduced = (lat: number) => Math.atan(Math.sqrt(1 - ECCENTRICITY_SQUARED) * Math.tan(lat * RADIANS));
  const unit = (beta: number, omega: number) =>
    [Math.cos(beta) * Math.cos(omega), Math.cos(beta) * Math.sin(omega), Math.sin(beta)] as const;
  const lambda = (lng2 - lng1) * RADIANS;
  const start = unit(reduced(lat1), 0);
  const along = (omega: number) => {
    const end = unit(reduced(lat2), omega);
    const dot = start[0] * end[0] + start[1] * end[1] + start[2] * end[2];
    const angle = Math.atan2(
      Math.hypot(
        start[1] * end[2] - start[2] * end[1],
        start[2] * end[0] - start[0] * end[2],
        start[0] * end[1] - start[1] * end[0],
      ),
      dot,
    );
    const at = (t: number) => {
      const [p, q] = [Math.sin((1 - t) * angle) / Math.sin(angle), Math.sin(t * angle) / Math.sin(angle)];
      return [p * start[0] + q * end[0], p * start[1] + q * end[1], p * start[2] + q * end[2]] as const;
    };
    return { at, angle, sineAlpha0: (start[0] * end[1] - start[1] * end[0]) / Math.sin(angle) };
  };
  /** Longitude on the ellipsoid up to t: ω minus the integral of (1 − √(1 − e² cos²β)) dω, dω = sin α₀ / cos²β dσ. */
  const longitude = (omega: number, upTo: number) => {
    const { at, angle, sineAlpha0 } = along(omega);
    const slope = (t: number) => {
      const cosSquared = 1 - at(t)[2] ** 2;
      return ((1 - Math.sqrt(1 - ECCENTRICITY_SQUARED * cosSquared)) * sineAlpha0 * angle) / cosSquared;
    };
    const pieces = 32;
    let integral = 0;
    for (let i = 0; i <= pieces; i++)
      integral += slope((upTo * i) / pieces) * (i === 0 || i === pieces ? 1 : i % 2 === 1 ? 4 : 2);
    const [x, y] = at(upTo);
    return Math.atan2(y, x) - (integral * upTo) / pieces / 3;
  };
  let omega = lambda;
  for (let i = 0; i < 12; i++) omega += lambda - longitude(omega, 1);
  const { at } = along(omega);
  return (t) => {
    const sineBeta = at(t)[2];
    const lat = Math.atan(Math.tan(Math.asin(sineBeta)) / Math.sqrt(1 - ECCENTRICITY_SQUARED)) / RADIANS;
    return [lng1 + longitude(omega, t) / RADIANS, lat];
  };
}

const ringArea = (ring: readonly (readonly [number, number])[]) =>
  Math.abs(areaOnEllipsoid(ring.slice(1).map((vertex, i) => geodesic(ring[i] ?? vertex, vertex))));

describe("area on the ellipsoid", { timeout: 30_000 }, () => {
  // GeographicLib 2.1.2, Planimeter, edges as geodesics; here the edges are geodesics too (above), the integral is the product's.
  test.each(geodesicAreas.filter(({ id }) => id !== "nc_dare"))(
    "of $id equals GeographicLib's to 1e-9",
    ({ id, geodesic_area_m2: expected }) => {
      let area = 0;
      for (const polygon of boundaryOf(id))
        area += polygon.reduce((sum, ring, i) => sum + (i === 0 ? 1 : -1) * ringArea(ring), 0);
      expect(Math.abs(area / expected - 1)).toBeLessThan(1e-9);
    },
  );

  // The whole ellipsoid is 510 065 621 724 089 m² (WGS 84; GeographicLib's EllipsoidArea). A quarter turn from equator to pole is an eighth.
  test("from equator to pole over a quarter turn is an eighth of the ellipsoid", () => {
    const north: EdgePath = (t) => [90 * t, 90];
    expect(areaUnderEdge(north) * 8).toBeCloseTo(510_065_621_724_089, -1);
  });

  test("is positive counter-clockwise and negative clockwise", () => {
    const corners = [
      [10, 50],
      [10.01, 50],
      [10.01, 50.01],
      [10, 50.01],
    ] as const;
    const path =
      (from: readonly number[], to: readonly number[]): EdgePath =>
      (t) => [
        (from[0] ?? 0) + t * ((to[0] ?? 0) - (from[0] ?? 0)),
        (from[1] ?? 0) + t * ((to[1] ?? 0) - (from[1] ?? 0)),
      ];
    const around = (ring: readonly (readonly number[])[]) =>
      areaOnEllipsoid(ring.map((from, i) => path(from, ring[(i + 1) % ring.length] ?? from)));
    expect(around(corners)).toBeGreaterThan(0);
    expect(around(corners.toReversed()) + around(corners)).toBeCloseTo(0, 6);
  });

  // By hand, a = 6 378 137, 1/f = 298.257 223 563: a·π/180 = 111 319.49; a(1 − e²)·π/180 = 110 574.28; a²/b·π/180 = 111 693.98.
  test("a degree is as long as the ellipsoid says", () => {
    expect(metresPerDegree(0).lng).toBeCloseTo(111_319.49, 2);
    expect(metresPerDegree(0).lat).toBeCloseTo(110_574.28, 1);
    expect(metresPerDegree(90).lat).toBeCloseTo(111_693.98, 1);
    expect(squareDegree(40)).toBeCloseTo(metresPerDegree(40).lng * metresPerDegree(40).lat, 0);
  });
});
