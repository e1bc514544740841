import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import { findCrossing, nodeRings } from "#shared/geometry/noding.ts";
import { areaOf, twiceSignedArea, vertexCount, type PlaneArea, type Ring } from "#shared/geometry/rings.ts";

vi.setConfig({ testTimeout: 60_000 });

const nodedAgain = (area: PlaneArea): PlaneArea => nodeRings(area.polygons.flat());
const rectangle = (x: number, y: number, width: number, height: number): Ring => [
  x,
  y,
  x + width,
  y,
  x + width,
  y + height,
  x,
  y + height,
];

/** Crossings of a ray to the west, in floating point: for points that are well away from every edge. */
function isInside(rings: readonly Ring[], x: number, y: number): boolean {
  let crossings = 0;
  for (const ring of rings) {
    for (let i = 0; i < ring.length; i += 2) {
      const [x1 = 0, y1 = 0] = [ring[i], ring[i + 1]];
      const [x2 = 0, y2 = 0] = [ring[(i + 2) % ring.length], ring[(i + 3) % ring.length]];
      if (y1 <= y !== y2 <= y && x1 + ((y - y1) / (y2 - y1)) * (x2 - x1) < x) crossings += 1;
    }
  }
  return crossings % 2 === 1;
}

function distance(rings: readonly Ring[], x: number, y: number): number {
  let least = Infinity;
  for (const ring of rings) {
    for (let i = 0; i < ring.length; i += 2) {
      const [x1 = 0, y1 = 0] = [ring[i], ring[i + 1]];
      const [x2 = 0, y2 = 0] = [ring[(i + 2) % ring.length], ring[(i + 3) % ring.length]];
      const length = (x2 - x1) ** 2 + (y2 - y1) ** 2;
      const along = length === 0 ? 0 : Math.max(0, Math.min(1, ((x - x1) * (x2 - x1) + (y - y1) * (y2 - y1)) / length));
      least = Math.min(least, Math.hypot(x1 + along * (x2 - x1) - x, y1 + along * (y2 - y1) - y));
    }
  }
  return least;
}

const ringsWithin = (most: number, corners = 10): fc.Arbitrary<Ring[]> =>
  fc.array(
    fc
      .array(fc.tuple(fc.integer({ min: -most, max: most }), fc.integer({ min: -most, max: most })), {
        minLength: 3,
        maxLength: corners,
      })
      .map((ring) => ring.flat()),
    { minLength: 1, maxLength: 3 },
  );

describe("noding", () => {
  test.each([3, 12, 60, 5_000, 1_000_000_000])(
    "leaves no crossing in any rings within %i mm, and noding again changes nothing",
    (most) => {
      fc.assert(
        fc.property(ringsWithin(most), (rings) => {
          const area = nodeRings(rings);
          expect(findCrossing(area)).toBeNull();
          expect(nodedAgain(area)).toEqual(area);
        }),
        { numRuns: 200 },
      );
    },
  );

  // Even–odd by a ray, at places more than 3 mm from every edge: snapping moves no edge by more than a millimetre a round.
  test("keeps what is inside by the even–odd rule", () => {
    const somewhere = fc.integer({ min: -600, max: 600 });
    fc.assert(
      fc.property(ringsWithin(500), fc.array(fc.tuple(somewhere, somewhere), { maxLength: 30 }), (rings, places) => {
        const noded = nodeRings(rings).polygons.flat();
        for (const [x, y] of places) {
          if (distance(rings, x, y) > 3) expect(isInside(noded, x, y)).toBe(isInside(rings, x, y));
        }
      }),
      { numRuns: 300 },
    );
  });

  // Rings of level and upright edges cross on whole millimetres only, so nothing may move: their area is counted square by square.
  test("of level and upright edges is exact: the area is the number of unit squares inside", () => {
    const stairs = fc
      .array(fc.tuple(fc.integer({ min: 0, max: 9 }), fc.integer({ min: 0, max: 9 })), { minLength: 2, maxLength: 6 })
      .map((turns) => turns.flatMap(([x, y], i) => [x, y, turns[(i + 1) % turns.length]?.[0] ?? 0, y]));
    fc.assert(
      fc.property(fc.array(stairs, { minLength: 1, maxLength: 3 }), (rings) => {
        let squares = 0n;
        for (let x = 0; x < 9; x += 1) {
          for (let y = 0; y < 9; y += 1) if (isInside(rings, x + 0.5, y + 0.5)) squares += 1n;
        }
        expect(areaOf(nodeRings(rings)).twiceMm2).toBe(2n * squares);
      }),
      { numRuns: 300 },
    );
  });

  test("outer rings run counter-clockwise from their corner furthest west, holes clockwise", () => {
    fc.assert(
      fc.property(ringsWithin(40), (rings) => {
        for (const polygon of nodeRings(rings).polygons) {
          polygon.forEach((ring, index) => {
            expect(twiceSignedArea(ring) > 0n).toBe(index === 0);
            expect(Math.min(...ring.filter((_, i) => i % 2 === 0))).toBe(ring[0]);
          });
        }
      }),
    );
  });

  test("the order, start and direction of rings do not matter", () => {
    fc.assert(
      fc.property(ringsWithin(300), fc.nat(), (rings, turns) => {
        const turned = rings.toReversed().map((ring) => {
          const start = 2 * (turns % (ring.length / 2));
          const rotated = [...ring.slice(start), ...ring.slice(0, start)];
          return Array.from(
            { length: rotated.length },
            (_, i) => rotated[rotated.length - (i % 2 === 0 ? i + 2 : i)] ?? 0,
          );
        });
        expect(nodeRings(turned)).toEqual(nodeRings(rings));
      }),
    );
  });
});

describe("noded rings", () => {
  test("rings without crossings come back with the same area and corners", () => {
    const rings = [rectangle(0, 0, 100, 100), rectangle(20, 20, 30, 30), rectangle(25, 25, 5, 5)];
    const area = nodeRings(rings);
    // By hand: 10,000 − 900 + 25 mm².
    expect(areaOf(area).twiceMm2).toBe(2n * 9125n);
    expect(area.polygons.map((polygon) => polygon.length)).toEqual([2, 1]);
    expect(vertexCount(area)).toBe(12);
  });

  // Ten squares, one inside the other: each outer ring has the next one as its hole, and no other.
  test("holes belong to the innermost ring around them, however deep they are nested", () => {
    const squares = Array.from({ length: 10 }, (_, i) => rectangle(7 * i, 3 * i, 200 - 14 * i, 200 - 6 * i));
    const area = nodeRings(squares);
    expect(area.polygons.map(([outer = [], hole = []]) => [outer[0], hole[0]])).toEqual(
      [0, 2, 4, 6, 8].map((i) => [7 * i, 7 * (i + 1)]),
    );
  });

  // By hand: 20 × 25 plots of 7 × 3 m; outside 2·(20 + 25) = 90 corners stay, each on the outer border.
  test("500 plots of a field trial that share their edges become one polygon", () => {
    const plots = Array.from({ length: 500 }, (_, i) =>
      rectangle((i % 20) * 7000, Math.floor(i / 20) * 3000, 7000, 3000),
    );
    const area = nodeRings(plots);
    expect(area.polygons.map((polygon) => polygon.length)).toEqual([1]);
    expect(areaOf(area).twiceMm2).toBe(2n * 500n * 21_000_000n);
    expect(vertexCount(area)).toBe(90);
  });

  // Neighbours with different corners on the shared edge (6 against 4 and 8): the shared edge goes all the same.
  test("neighbours whose corners differ along the shared edge become one polygon", () => {
    const area = nodeRings([rectangle(0, 0, 10, 10), [10, 0, 20, 0, 20, 10, 10, 10, 10, 8, 10, 4]]);
    expect(area.polygons.map((polygon) => polygon.length)).toEqual([1]);
    expect(areaOf(area).twiceMm2).toBe(400n);
  });

  test("parts that touch at a corner stay two polygons; a hole that touches the border stays a hole", () => {
    expect(nodeRings([rectangle(0, 0, 10, 10), rectangle(10, 10, 10, 10)]).polygons).toEqual([
      [rectangle(0, 0, 10, 10)],
      [rectangle(10, 10, 10, 10)],
    ]);
    const touched = nodeRings([rectangle(0, 0, 10, 10), [0, 5, 4, 3, 4, 7]]);
    expect(touched.polygons).toEqual([
      [
        [0, 0, 10, 0, 10, 10, 0, 10, 0, 5],
        [0, 5, 4, 7, 4, 3],
      ],
    ]);
    expect(areaOf(touched).twiceMm2).toBe(200n - 16n);
  });

  // By hand: the diagonals of (0,0) (3,0) (0,3) (3,3) in bow-tie order cross at (1.5, 1.5), rounded half up to (2, 2).
  test("a crossing off the millimetre grid is rounded half up and becomes a corner of both rings", () => {
    expect(nodeRings([[0, 0, 3, 0, 0, 3, 3, 3]]).polygons).toEqual([[[0, 0, 3, 0, 2, 2]], [[0, 3, 2, 2, 3, 3]]]);
  });

  test("what has no inside gives no polygon", () => {
    expect(nodeRings([]).polygons).toEqual([]);
    expect(nodeRings([[0, 0, 5, 5]]).polygons).toEqual([]);
    expect(nodeRings([rectangle(0, 0, 5, 5), rectangle(0, 0, 5, 5)]).polygons).toEqual([]);
  });

  // A star of 20,000 corners, 14 m across and rounded to millimetres: thousands of its edges touch or cross.
  test("a boundary with more corners than millimetres settles", () => {
    const ring = Array.from({ length: 20_000 }, (_, i) => {
      const angle = (2 * Math.PI * i) / 20_000;
      const radius = 2000 * (1 + 0.3 * Math.sin(5 * angle) + 0.01 * Math.sin(7919 * i));
      return [Math.round(radius * Math.cos(angle)), Math.round(radius * Math.sin(angle))];
    }).flat();
    const area = nodeRings([ring]);
    expect(findCrossing(area)).toBeNull();
    expect(nodedAgain(area)).toEqual(area);
  });
});

describe("the test for crossings", () => {
  const found = (...polygons: Ring[][]) => findCrossing({ polygons })?.at ?? null;
  const square = rectangle(0, 0, 10, 10);

  test("finds edges that cross, and where", () => {
    expect(findCrossing({ polygons: [[[0, 0, 10, 10, 10, 0, 0, 10]]] })).toEqual({
      a: expect.objectContaining({ fromX: 0 }) as unknown,
      b: expect.objectContaining({ fromX: 0 }) as unknown,
      at: { eastMm: 5, northMm: 5 },
    });
  });

  test("finds edges that overlap, equal or in part", () => {
    expect(found([square], [rectangle(10, 0, 10, 10)])).not.toBeNull();
    expect(found([square], [rectangle(10, 2, 10, 5)])).not.toBeNull();
  });

  test("finds a corner inside another edge", () => {
    expect(found([square, [0, 5, 4, 3, 4, 7]])).toEqual({ eastMm: 0, northMm: 5 });
  });

  // Neighbouring Fibonacci numbers: F45·F43 − F44² = 1, so the corner (F44, F43) lies left of the edge (0, 0) → (F45, F44), by less
  // than a millionth of a millimetre. Each product is near 5·10¹⁷, where numbers in double precision are 64 apart.
  test("tells a corner that an edge passes by a hair from one that it meets", () => {
    const [f43, f44, f45] = [433_494_437, 701_408_733, 1_134_903_170];
    const triangle = [0, 0, f45, 0, f45, f44];
    expect(found([triangle], [[f44, f43, f44, f43 + 50, f44 - 50, f43 + 50]])).toBeNull();
    expect(found([triangle], [[f44, f43, f44, f43 - 50, f44 + 50, f43 - 50]])).not.toBeNull();
  });

  test("finds rings that cross at a shared corner, and lets rings touch there", () => {
    const bowTie = [0, 0, 5, 5, 10, 10, 10, 0, 5, 5, 0, 10];
    expect(found([bowTie])).toEqual({ eastMm: 5, northMm: 5 });
    // A triangle that runs clockwise, and a ring that enters it at its upper corner and leaves at its right one.
    expect(found([[0, 0, 5, 5, 10, 0]], [[5, 5, 8, 1, 10, 0, 20, 10, 5, 20]])).not.toBeNull();
    expect(found([[0, 0, 5, 5, 10, 0]], [[5, 5, 20, 10, 5, 20]])).toBeNull();
    expect(found([[0, 0, 5, 5, 0, 10]], [[5, 5, 10, 0, 10, 10]])).toBeNull();
    expect(
      found([
        [0, 0, 10, 0, 10, 10, 0, 10, 0, 5],
        [0, 5, 4, 7, 4, 3],
      ]),
    ).toBeNull();
  });

  test("finds nothing in a square with a hole and an island", () => {
    expect(found([rectangle(0, 0, 100, 100), rectangle(20, 20, 30, 30)], [rectangle(25, 25, 5, 5)])).toBeNull();
  });
});
