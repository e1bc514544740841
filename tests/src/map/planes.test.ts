import { describe, expect, it } from "vitest";
import { lngLatFromNet, localPlane } from "../../../src/map/planes.ts";

describe("planes for looking", () => {
  // Any polynomial of second degree in each direction is met exactly by nine points.
  it("a net of 3 × 3 points gives back the surface that it was taken from", () => {
    const lng = (e: number, n: number) => 2 + e / 70_000 + (n * e) / 1e11 + e ** 2 / 1e13;
    const lat = (e: number, n: number) => 51 + n / 111_000 - n ** 2 / 1e13;
    const net = [0, 500, 1000].flatMap((e) =>
      [0, 400, 800].map((n): [number, number, number, number] => [e, n, lng(e, n), lat(e, n)]),
    );
    const lngLatOf = lngLatFromNet(net);
    for (const [e, n] of [
      [0, 0],
      [137, 622],
      [1000, 800],
      [-50, 900],
    ] as const) {
      expect(lngLatOf(e, n).lng).toBeCloseTo(lng(e, n), 10);
      expect(lngLatOf(e, n).lat).toBeCloseTo(lat(e, n), 10);
    }
  });

  it("another net is refused", () => {
    expect(() => lngLatFromNet([[0, 0, 2, 51]])).toThrow(RangeError);
  });

  // At 60° north a degree of longitude is half as long as one of latitude.
  it("the plane of an outline in degrees is narrowed by the cosine of its latitude and leads back", () => {
    const plane = localPlane([
      [
        [
          [10, 59],
          [12, 59],
          [12, 61],
          [10, 61],
        ],
      ],
    ]);
    const across = plane.bounds.east - plane.bounds.west;
    const up = plane.bounds.north - plane.bounds.south;
    expect(across / up).toBeCloseTo(0.5, 9);
    expect(up).toBeCloseTo(2 * 111_195, 3);
    const { east, north } = plane.planeOf({ lng: 11.25, lat: 60.5 });
    expect(plane.lngLatOf(east, north).lng).toBeCloseTo(11.25, 12);
    expect(plane.lngLatOf(east, north).lat).toBeCloseTo(60.5, 12);
  });
});
