import { describe, expect, test } from "vitest";
import { readWkt } from "#shared/exchange/read-wkt.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { imported, textOf } from "./imports.ts";

const square = "((0 0, 10 0, 10 10, 0 10, 0 0))";

describe("well-known text", () => {
  // The reference file: a rectangle with a rectangular hole, five positions each.
  test("a polygon with a hole is read, and its system is asked", () => {
    const found = readWkt(textOf(imported("made/area.wkt")));
    expect(found.polygons.map((polygon) => polygon.map((ring) => ring.length))).toEqual([[5, 5]]);
    expect(found.polygons[0]?.[0]?.[1]).toEqual([14.26, 51.55]);
    expect(found.crs.kind).toBe("missing");
  });

  test("the SRID of the extended kind says the system", () => {
    expect(readWkt(`SRID=25833;POLYGON${square}`).crs).toMatchObject({ text: "EPSG:25833", byFile: true });
    expect(readWkt(`srid = 0 ; polygon${square}`).crs.kind).toBe("missing");
  });

  // OGC Simple Features 1.2.1, 7.2: Z, M and ZM stand between type and brackets; heights are counted, not used.
  test.each([
    ["POLYGON Z ((0 0 1, 10 0 1, 10 10 1, 0 0 1))", 4],
    ["POLYGON ZM ((0 0 1 2, 10 0 1 2, 10 10 1 2, 0 0 1 2))", 4],
    ["POLYGON((0 0, 1e1 0, 1.0E1 10, 0 0))", 0],
  ])("%s is a triangle", (text, heights) => {
    const found = readWkt(text);
    expect(found.polygons).toEqual([
      [
        [
          [0, 0],
          [10, 0],
          [10, 10],
          [0, 0],
        ].map(([x, y]) => [x, y]),
      ],
    ]);
    expect(found.heights).toBe(heights);
  });

  test("several geometries, collections and empty ones are taken together", () => {
    const found = readWkt(
      `MULTIPOLYGON(${square}, ((20 0, 30 0, 30 10, 20 0)))\nPOLYGON EMPTY;\nGEOMETRYCOLLECTION(POINT(1 2), POLYGON${square})\nLINESTRING(0 0, 1 1)`,
    );
    expect(found.polygons).toHaveLength(3);
    expect(found).toMatchObject({ features: 4, others: { points: 1, lines: 1, empty: 1 } });
  });
});

describe("text that is not whole", () => {
  test.each([
    ["a bracket that is not closed", "POLYGON((0 0, 10 0, 10 10, 0 0)", /Geometry 1 breaks off/],
    ["what is no geometry after one", `POLYGON${square} and more`, /Geometry 2 begins with “and more”/],
    ["a coordinate that is no number", "POLYGON((0 0, x 0, 10 10, 0 0))", /not two numbers/],
    ["a bracket too many", `POLYGON${square})`, /Geometry 2 begins with/],
  ])("%s is refused with its place", (_, text, message) => {
    const refused = refusalOf(() => readWkt(text));
    expect(refused.code).toBe("file-damaged");
    expect(refused.message).toMatch(message);
  });

  test("two systems in one text are refused", () => {
    const refused = refusalOf(() => readWkt(`SRID=25832;POLYGON${square}\nSRID=25833;POLYGON${square}`));
    expect(refused).toMatchObject({ code: "crs-unknown" });
    expect(refused.message).toContain("SRID 25832 and 25833");
  });
});
