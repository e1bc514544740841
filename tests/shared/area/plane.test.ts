import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { ImportedArea } from "#shared/area/imported-area.ts";
import { outlineForMap } from "#shared/area/outline.ts";
import { makePlaneRings } from "#shared/area/plane.ts";
import { findCrossing } from "#shared/geometry/noding.ts";
import { areaOf, type PlaneArea } from "#shared/geometry/rings.ts";
import { crsFromEpsg } from "#shared/projection/crs.ts";
import { transformer, type Position } from "#shared/projection/transformer.ts";
import { imported } from "../exchange/imports.ts";
import { boundaryOf, geodesicAreas } from "../projection/reference.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { read } from "./read.ts";

const degrees = crsFromEpsg(4326);
const squareMetresOf = (area: PlaneArea): number => Number(areaOf(area).twiceMm2) / 2e6;
const open = (ring: readonly Position[]): Position[] => ring.slice(0, -1);
const areaIn = (epsg: number, ...polygons: (readonly Position[])[][]): ImportedArea => ({
  crs: crsFromEpsg(epsg),
  polygons,
});

/** Millimetres from a point to the nearest edge of an area. */
function distanceTo(area: PlaneArea, [x, y]: Position): number {
  let best = Infinity;
  for (const ring of area.polygons.flat()) {
    for (let i = 0; i < ring.length; i += 2) {
      const [ax, ay, bx, by] = [
        ring[i] ?? 0,
        ring[i + 1] ?? 0,
        ring[(i + 2) % ring.length] ?? 0,
        ring[(i + 3) % ring.length] ?? 0,
      ];
      const length = (bx - ax) ** 2 + (by - ay) ** 2;
      const t = length === 0 ? 0 : Math.min(1, Math.max(0, ((x - ax) * (bx - ax) + (y - ay) * (by - ay)) / length));
      best = Math.min(best, Math.hypot(x - ax - t * (bx - ax), y - ay - t * (by - ay)));
    }
  }
  return best;
}

/** A star-shaped ring about a place, never crossing itself: corners in order of direction. */
const star = (lng: number, lat: number, reach: number, radii: readonly number[]): Position[] =>
  radii.map((radius, i) => {
    const angle = (2 * Math.PI * i) / radii.length;
    return [lng + reach * radius * Math.cos(angle), lat + reach * radius * Math.sin(angle)];
  });

describe("rings on a frame's plane (R1)", { timeout: 30_000 }, () => {
  // R1: 5 mm, and rounding to whole millimetres moves a corner by at most 0.71 mm, noding by as much again.
  test("every point of an edge's true image lies within 5 mm and rounding of the rings, and no two edges cross", () => {
    const radii = fc.array(fc.double({ min: 0.3, max: 1, noNaN: true }), { minLength: 3, maxLength: 9 });
    fc.assert(
      fc.property(
        radii,
        fc.double({ min: -60, max: 70, noNaN: true }),
        fc.constantFrom(0.0005, 0.02, 0.5),
        (radius, lat, reach) => {
          const ring = star(14.5, lat, reach, radius);
          const crs = crsFromEpsg(lat < 0 ? 32733 : 32633);
          const { area } = makePlaneRings({ crs: degrees, polygons: [[ring]] }, crs);
          expect(findCrossing(area)).toBeNull();
          const { forward } = transformer(degrees, crs);
          ring.forEach((from, i) => {
            const to = ring[(i + 1) % ring.length] ?? from;
            for (let k = 0; k <= 37; k++) {
              const t = k / 37;
              const [east, north] = forward([from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])]);
              expect(distanceTo(area, [east * 1000, north * 1000])).toBeLessThan(5 + 1.42);
            }
          });
        },
      ),
      { numRuns: 60 },
    );
  });

  // Scale of areas 100 km west of the central meridian: 0.9996² · (1 + (100/6378)²) = 0.99945.
  test("are whole millimetres, rounded half up", () => {
    const ring: Position[] = [
      [400_000.0005, 5_700_000.0004],
      [400_100, 5_700_000],
      [400_100.0015, 5_700_100.49951],
    ];
    const { area, notes } = makePlaneRings(areaIn(25833, [ring]), crsFromEpsg(25833));
    const corners = area.polygons[0]?.[0] ?? [];
    expect([...corners].sort((a, b) => a - b)).toEqual([
      400_000_001, 400_100_000, 400_100_002, 5_700_000_000, 5_700_000_000, 5_700_100_500,
    ]);
    expect(notes).toEqual(["On the plane of ETRS89 / UTM zone 33N areas come out 0.06 % small here."]);
  });

  test("get no vertices where the source is in the frame's own system", () => {
    const ring: Position[] = [
      [400_000, 5_700_000],
      [480_000, 5_700_000],
      [480_000, 5_790_000],
      [400_000, 5_790_000],
    ];
    const { area } = makePlaneRings(areaIn(25833, [ring]), crsFromEpsg(25833));
    expect(area.polygons[0]?.[0]).toHaveLength(8);
    expect(squareMetresOf(area)).toBe(80_000 * 90_000);
  });
});

describe("vertices added and edges dissolved on the plane", { timeout: 30_000 }, () => {
  // A parallel of 51° over 6 minutes (7 km) bows by L²/(8R)·tan φ ≈ 1.2 m in UTM: vertices are needed.
  test("get vertices where a straight edge of the source is bent on the plane", () => {
    const { area, notes } = makePlaneRings(
      areaIn(4326, [
        [
          [14, 51],
          [14.1, 51],
          [14.1, 51.1],
          [14, 51.1],
        ],
      ]),
      crsFromEpsg(32633),
    );
    expect(area.polygons[0]?.[0]?.length).toBeGreaterThan(40);
    expect(notes[0]).toMatch(/^\d+ vertices added/);
  });

  // The 500 plots of 1/500 acre lie in 20 rows of 25 without gaps; edges that two plots share cancel, so one ring stays.
  test("of 500 plots that share edges are one ring without holes, whatever the plane", () => {
    const { area } = read(imported("wheat.zip"), { crs: "EPSG:32631" }).value;
    for (const epsg of [32631, 32731, 3857]) {
      const { polygons } = makePlaneRings(area, crsFromEpsg(epsg)).area;
      expect(
        polygons.map((polygon) => polygon.length),
        `EPSG:${epsg}`,
      ).toEqual([1]);
    }
  });

  // A neighbour with a vertex in the middle of a long border: projected, the long edge bows and the short ones bow less.
  test("of neighbours that share a border with different vertices leave no sliver between them", () => {
    const west: Position[] = [
      [14, 51],
      [14.05, 51],
      [14.05, 51.1],
      [14, 51.1],
    ];
    const east: Position[] = [
      [14.05, 51],
      [14.1, 51],
      [14.1, 51.1],
      [14.05, 51.1],
      [14.05, 51.0371],
      [14.05, 51.0123],
    ];
    for (const pair of [
      [west, east],
      [east, west],
      [west, [...east].reverse()],
    ]) {
      const { area } = makePlaneRings(areaIn(4326, ...pair.map((ring) => [ring])), crsFromEpsg(32632));
      expect(area.polygons.map((polygon) => polygon.length)).toEqual([1]);
    }
  });

  test("of a borderline slanting across a neighbour's vertices leave no sliver either", () => {
    const at = (t: number): Position => [14 + 0.1 * t, 51 + 0.037 * t];
    const south: Position[] = [[14, 50.9], [14.1, 50.9], at(1), at(0)];
    const north: Position[] = [at(0), at(0.21), at(0.5), at(0.83), at(1), [14.1, 51.2], [14, 51.2]];
    const { area } = makePlaneRings(areaIn(4326, [south], [north]), crsFromEpsg(32632));
    expect(area.polygons.map((polygon) => polygon.length)).toEqual([1]);
  });
});

describe("plane rings as a whole", { timeout: 30_000 }, () => {
  // geodesic_areas.json: area on the plane (PROJ 9.1.1, vertices only) over area on the ellipsoid.
  test.each(geodesicAreas.filter(({ id }) => id === "augusta" || id === "falklands"))(
    "of $id have the plane area that PROJ gives, to 5e-5",
    ({ id, projected_crs: crs, geodesic_area_m2: geodesic, projected_over_geodesic: ratio }) => {
      const polygons = boundaryOf(id).map((polygon) => polygon.map((ring) => open(ring)));
      const { area } = makePlaneRings({ crs: degrees, polygons }, crsFromEpsg(Number(crs.slice(5))));
      expect(Math.abs(squareMetresOf(area) / geodesic / ratio - 1)).toBeLessThan(5e-5);
    },
  );

  test("tell how far they are, and can be stopped by it", () => {
    const shares: number[] = [];
    const two = areaIn(
      4326,
      [
        [
          [14, 51],
          [14.1, 51],
          [14.1, 51.1],
        ],
      ],
      [
        [
          [15, 51],
          [15.1, 51],
          [15.1, 51.1],
        ],
      ],
    );
    makePlaneRings(two, crsFromEpsg(32633), (share) => shares.push(share));
    expect(shares).toEqual([0.5, 1]);
    const stop = () => {
      throw new RangeError("stopped");
    };
    expect(() => makePlaneRings(two, crsFromEpsg(32633), stop)).toThrow("stopped");
  });

  // The seven parameters of the British datum hold in Britain; on the other side of the globe they do not come home, by 10 cm.
  test("are refused in a system that cannot show the place", () => {
    const far: Position[] = [
      [-165, 5],
      [-164.9, 5],
      [-164.9, 5.1],
    ];
    const { code, message } = refusalOf(() => makePlaneRings(areaIn(4326, [far]), crsFromEpsg(27700)));
    expect(code).toBe("crs-unsupported");
    expect(message).toContain("made for this place");
  });

  test("are refused for a frame in degrees, and when nothing is left", () => {
    const ring: Position[] = [
      [400_000, 5_700_000],
      [400_000.0001, 5_700_000],
      [400_000, 5_700_000.0001],
    ];
    expect(refusalOf(() => makePlaneRings(areaIn(25833, [ring]), degrees)).code).toBe("crs-unsupported");
    expect(refusalOf(() => makePlaneRings(areaIn(25833, [ring]), crsFromEpsg(25833))).code).toBe("area-size");
  });
});

describe("the outline for a map", { timeout: 30_000 }, () => {
  test("is the area's vertices in WGS 84", () => {
    const { polygons, simplified } = outlineForMap(
      areaIn(32633, [
        [
          [500_000, 5_700_000],
          [500_100, 5_700_000],
          [500_100, 5_700_100],
        ],
      ]),
    );
    expect(simplified).toBe(false);
    expect(polygons[0]?.[0]?.[0]?.[0]).toBeCloseTo(15, 9);
    expect(polygons[0]?.[0]).toHaveLength(3);
  });

  test("is thinned out above 20,000 vertices, by less than one part in 8,000 of the extent", () => {
    const many = star(
      14,
      51,
      0.1,
      Array.from({ length: 40_000 }, (_, i) => 0.9 + 0.1 * Math.sin(i / 500)),
    );
    const { polygons, simplified } = outlineForMap(areaIn(4326, [many]));
    const ring = polygons[0]?.[0] ?? [];
    expect(simplified).toBe(true);
    expect(ring.length).toBeLessThan(2000);
    const flat: PlaneArea = { polygons: [[ring.flat()]] };
    for (let i = 0; i < many.length; i += 97)
      expect(distanceTo(flat, many[i] ?? [0, 0])).toBeLessThanOrEqual(0.2 / 8000);
  });
});
