import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { contains, groupRings, twiceSignedArea } from "#shared/area/group-rings.ts";
import { mendRings } from "#shared/area/mend-rings.ts";
import { crsFromEpsg } from "#shared/projection/crs.ts";
import type { Position } from "#shared/projection/transformer.ts";
import { box } from "./read.ts";

const plane = crsFromEpsg(25833);
const degrees = crsFromEpsg(4326);
const mend = (...rings: (readonly Position[])[]) => mendRings([rings], plane);

describe("mending of rings", () => {
  test("leaves a good ring as it is, but for its repeated last vertex", () => {
    expect(mend(box(0, 0, 10, 10))).toEqual({
      polygons: [
        [
          [
            [0, 0],
            [10, 0],
            [10, 10],
            [0, 10],
          ],
        ],
      ],
      mended: [],
    });
  });

  test("closes an open ring", () => {
    const { polygons, mended } = mend([
      [0, 0],
      [10, 0],
      [10, 10],
      [0, 10],
    ]);
    expect(polygons).toEqual([
      [
        [
          [0, 0],
          [10, 0],
          [10, 10],
          [0, 10],
        ],
      ],
    ]);
    expect(mended).toEqual(["1 ring was open; closed with a straight edge."]);
  });

  test("takes out vertices that repeat the one before", () => {
    const { polygons, mended } = mend([
      [0, 0],
      [0, 0],
      [10, 0],
      [10, 10],
      [10, 10],
      [10, 10],
      [0, 0],
    ]);
    expect(polygons).toEqual([
      [
        [
          [0, 0],
          [10, 0],
          [10, 10],
        ],
      ],
    ]);
    expect(mended).toEqual(["3 vertices repeated the one before; taken out."]);
  });
});

describe("mending of spikes", () => {
  // A spike of 20 m that is 0.9 mm wide at its foot goes; one of 1.1 mm stays.
  test.each([
    [0.0009, 6],
    [0.0011, 7],
  ])("a spike %d m wide leaves %d vertices", (width, left) => {
    const { polygons, mended } = mend([
      [0, 0],
      [10, 0],
      [10, 5],
      [30, 5],
      [10, 5 + width],
      [10, 10],
      [0, 10],
      [0, 0],
    ]);
    const ring = polygons[0]?.[0] ?? [];
    expect(ring).toHaveLength(left);
    expect(mended).toHaveLength(left === 6 ? 1 : 0);
  });

  test("a spike without width goes wherever the ring begins", () => {
    const ring: Position[] = [
      [0, 0],
      [10, 0],
      [10, 10],
      [20, 10],
      [10, 10],
      [0, 10],
    ];
    for (let start = 0; start < ring.length; start++) {
      const turned = [...ring.slice(start), ...ring.slice(0, start)];
      const { polygons, mended } = mend([...turned, turned[0] ?? [0, 0]]);
      expect(polygons[0]?.[0], `from vertex ${start}`).toHaveLength(4);
      expect(mended[0]).toMatch(/^1 spike/);
    }
  });

  // 1e-8 degrees of latitude are 1.1 mm, 5e-9 are 0.56 mm.
  test("measures spikes on the ground where coordinates are degrees", () => {
    const spike = (width: number): Position[] => [
      [14, 51],
      [14.1, 51],
      [14.1, 51.05],
      [14.2, 51.05],
      [14.1, 51.05 + width],
      [14.1, 51.1],
      [14, 51.1],
      [14, 51],
    ];
    expect(mendRings([[spike(5e-9)]], degrees).mended).toHaveLength(1);
    expect(mendRings([[spike(1.1e-8)]], degrees).mended).toHaveLength(0);
  });
});

describe("mending of whole polygons", () => {
  test("turns outer rings counter-clockwise and holes clockwise, and says that it changes nothing", () => {
    const { polygons, mended } = mend([...box(0, 0, 10, 10)].reverse(), box(2, 2, 4, 4));
    expect(polygons[0]?.map((ring) => Math.sign(twiceSignedArea(ring)))).toEqual([1, -1]);
    expect(mended).toEqual(["2 rings ran the other way round; turned, which changes nothing."]);
  });

  test("leaves rings without an area aside, holes with their outer ring", () => {
    const { polygons, mended } = mendRings(
      [
        [
          [
            [0, 0],
            [1, 0],
            [0, 0],
          ],
          box(0, 0, 1, 1),
        ],
        [
          box(0, 0, 10, 10),
          [
            [1, 1],
            [2, 2],
            [1, 1],
          ],
        ],
      ],
      plane,
    );
    expect(polygons).toHaveLength(1);
    expect(polygons[0]).toHaveLength(1);
    expect(mended).toEqual(["3 rings without an area left aside."]);
  });

  test("mends nothing a second time", () => {
    const coordinate = fc.integer({ min: 0, max: 6 });
    fc.assert(
      fc.property(fc.array(fc.tuple(coordinate, coordinate), { minLength: 1, maxLength: 12 }), (ring) => {
        const once = mendRings([[ring]], plane).polygons;
        const again = mendRings(
          once.map((polygon) => polygon.map((r) => [...r, ...r.slice(0, 1)])),
          plane,
        );
        expect(again.polygons).toEqual(once);
        expect(again.mended).toEqual([]);
      }),
    );
  });
});

describe("grouping of rings", () => {
  test("a hole goes to the smallest ring that holds it", () => {
    const hole = box(4, 4, 5, 5);
    const grouped = groupRings([[box(0, 0, 100, 100), hole], [box(3, 3, 6, 6)]]);
    expect(grouped.map((polygon) => polygon.length)).toEqual([1, 2]);
  });

  test("a hole that nothing holds stays where it was", () => {
    const grouped = groupRings([[box(0, 0, 1, 1), box(5, 5, 6, 6)], [box(20, 20, 21, 21)]]);
    expect(grouped.map((polygon) => polygon.length)).toEqual([2, 1]);
  });

  test("a position is inside a ring by even and odd", () => {
    expect(contains(box(0, 0, 10, 10), [5, 5])).toBe(true);
    expect(contains(box(0, 0, 10, 10), [15, 5])).toBe(false);
  });
});
