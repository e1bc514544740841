import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { areaOf, boundsOf, ringsFromJson, ringsToJson, twiceSignedArea, vertexCount } from "#shared/geometry/rings.ts";

describe("rings", () => {
  // By hand: a square of 10 mm with a hole of 2 mm: 100 − 4 = 96 mm², twice 192.
  const json = [
    [
      [
        [0, 0],
        [10, 0],
        [10, 10],
        [0, 10],
      ],
      [
        [4, 4],
        [4, 6],
        [6, 6],
        [6, 4],
      ],
    ],
  ];

  test("are read from and written to [polygon][ring][corner][x, y]", () => {
    const area = ringsFromJson(json);
    expect(ringsToJson(area)).toEqual(json);
    expect(areaOf(area).twiceMm2).toBe(192n);
    expect(vertexCount(area)).toBe(8);
    expect(boundsOf(area)).toEqual({ minX: 0, minY: 0, maxX: 10, maxY: 10 });
  });

  test("of anything but whole millimetres are refused with their place", () => {
    const bad: unknown[] = [[0.5, 0], [2 ** 53, 0], ["0", 0], [0], [0, 0, 0]];
    for (const corner of bad) {
      expect(() => ringsFromJson([[[[0, 0], [1, 0], corner]]])).toThrow("Ring 1 of polygon 1");
    }
    expect(() =>
      ringsFromJson([
        [
          [
            [0, 0],
            [1, 0],
          ],
        ],
      ]),
    ).toThrow("three corners");
    expect(() => ringsFromJson({ polygons: [] })).toThrow("not a list of polygons");
  });

  test("an area without corners has no bounds", () => {
    expect(() => boundsOf({ polygons: [] })).toThrow(RangeError);
  });

  // The shoelace formula in big integers.
  test("have exact areas however far and large they are", () => {
    const far = fc.integer({ min: -900_000_000_000, max: 900_000_000_000 });
    fc.assert(
      fc.property(fc.array(fc.tuple(far, far), { minLength: 3, maxLength: 12 }), (corners) => {
        let sum = 0n;
        corners.forEach(([x1, y1], i) => {
          const [x2, y2] = corners[(i + 1) % corners.length] ?? [0, 0];
          sum += BigInt(x1) * BigInt(y2) - BigInt(x2) * BigInt(y1);
        });
        expect(twiceSignedArea(corners.flat())).toBe(sum);
      }),
    );
  });
});
