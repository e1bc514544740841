import { zipSync } from "fflate";
import { describe, expect, test } from "vitest";
import { readArea } from "#shared/exchange/read-area.ts";
import { imported } from "../exchange/imports.ts";
import { makeShp, rectangle } from "../exchange/make-shapefile.ts";
import { box, geojson, inSystem, read, refused } from "./read.ts";

const made = (name: string): Uint8Array => imported(`made/${name}`);

// Each kind of bad boundary file, and what its sender is told.
describe("a boundary that cannot be used", { timeout: 30_000 }, () => {
  test.each([
    ["an empty file", made("empty.geojson"), "file-empty", /empty\. Nothing was changed/],
    ["an image", made("picture.geojson"), "file-unknown", /an image \(PNG\).*GeoJSON/],
    ["plain text called .zip", made("not_a_zip.zip"), "file-unknown", /plain text/],
    ["a PDF", new TextEncoder().encode("%PDF-1.7"), "file-unknown", /PDF/],
    [
      "a text document",
      zipSync({ "[Content_Types].xml": new Uint8Array(3), "word/document.xml": new Uint8Array(3) }),
      "file-unknown",
      /office document/,
    ],
    ["a table", new TextEncoder().encode("name;x;y\na;1;2\n"), "file-unknown", /plain text, beginning “name;x;y”/],
    ["a .shp by itself", makeShp([[rectangle(0, 0, 1, 1)]]), "file-unknown", /zip/],
    ["a zip without the geometry part", made("zip_without_shp.zip"), "file-unknown", /no \.shp/],
    ["a shapefile cut short", made("zip_shp_cut_short.zip"), "file-damaged", /cut short/],
    ["entities", made("entities.kml"), "file-unsafe", /entities/],
    ["points only", made("points_only.geojson"), "area-none", /^Found 4 points, and no area/],
    ["a crossing ring", made("bowtie.geojson"), "rings-cross", /longitude 14\.255000, latitude 51\.554000/],
    ["longitude and latitude exchanged", made("swapped.geojson"), "coordinates-swapped", /longitude \(east\) first/],
    ["less than 1 m²", inSystem(25833, [box(400_000, 5_700_000, 400_000.9, 5_700_000.9)]), "area-size", /0\.81 m²/],
    [
      "no width at all",
      geojson([
        [
          [14, 51],
          [15, 51],
          [14, 51],
          [14, 51],
        ],
      ]),
      "area-none",
      /fewer than three corners/,
    ],
    [
      "an area across 180°",
      geojson([
        [
          [179, 10],
          [-179, 10],
          [-179, 11],
          [179, 11],
          [179, 10],
        ],
      ]),
      "area-size",
      /180°/,
    ],
    ["an area on both sides of 180°", geojson([box(179, 10, 180, 11)], [box(-180, 10, -179, 11)]), "area-size", /180°/],
    ["longitudes past 180°", geojson([box(179, 10, 181, 11)]), "area-question", /past 180°/],
  ])("%s is refused with a fact and a next step", (_, bytes, code, detail) => {
    const problem = refused(bytes);
    expect(problem.code).toBe(code);
    expect(problem.message).toMatch(detail);
  });

  test("shows where it crosses itself", () => {
    expect(refused(made("bowtie.geojson")).question).toMatchObject({
      kind: "place",
      at: { lng: expect.closeTo(14.255, 9) as number, lat: expect.closeTo(51.554, 9) as number },
    });
  });

  test("shows where the area would be with its coordinates exchanged", () => {
    expect(refused(made("swapped.geojson")).question).toMatchObject({
      kind: "axes",
      asWritten: null,
      exchanged: { lng: expect.closeTo(147.335, 6) as number, lat: expect.closeTo(-42.875, 6) as number },
    });
  });

  test("is read the other way round once somebody says so, and the report tells it", () => {
    const bytes = made("swapped.geojson");
    const { report } = readArea({ name: "s.geojson", bytes }, { axes: "exchanged" }, {}).value;
    expect(report.mended).toContain("Longitude and latitude were exchanged, as told at import.");
    expect(report.bounds).toMatchObject([
      expect.closeTo(147.33, 1),
      expect.closeTo(-42.88, 1),
      expect.anything(),
      expect.anything(),
    ]);
  });
});

describe("rings that contradict each other", { timeout: 30_000 }, () => {
  const outer = box(400_000, 5_700_000, 400_100, 5_700_100);

  // Two squares of 100 m that share 100 × 40 m.
  test("overlapping parts are refused with the m² that would count twice", () => {
    const { code, message } = refused(inSystem(25833, [outer], [box(400_060, 5_700_000, 400_160, 5_700_100)]));
    expect(code).toBe("parts-overlap");
    expect(message).toMatch(/^Polygons 1 and 2 overlap: 4,00\d m²/);
  });

  test("the same polygon twice is refused", () => {
    expect(refused(inSystem(25833, [outer], [outer])).message).toMatch(/10,0\d\d m²/);
  });

  test("a polygon within another is refused", () => {
    expect(refused(inSystem(25833, [outer], [box(400_010, 5_700_010, 400_020, 5_700_020)])).code).toBe("parts-overlap");
  });

  test("an island in a hole is not an overlap", () => {
    const ring = [outer, box(400_010, 5_700_010, 400_090, 5_700_090)];
    expect(read(inSystem(25833, ring, [box(400_020, 5_700_020, 400_080, 5_700_080)])).value.report.parts).toBe(2);
  });

  test("a hole outside its polygon is refused", () => {
    const { code, message } = refused(inSystem(25833, [outer, box(400_200, 5_700_000, 400_210, 5_700_010)]));
    expect(code).toBe("rings-cross");
    expect(message).toMatch(/a hole that lies outside it/);
  });

  test("overlapping holes are refused", () => {
    const holes = [box(400_010, 5_700_010, 400_030, 5_700_030), box(400_025, 5_700_010, 400_050, 5_700_030)];
    expect(refused(inSystem(25833, [outer, ...holes])).code).toBe("rings-cross");
  });

  test("a ring that runs through itself at a corner is refused", () => {
    const eight: [number, number][] = [
      [0, 0],
      [50, 50],
      [100, 0],
      [100, 100],
      [50, 50],
      [0, 100],
      [0, 0],
    ];
    const moved = eight.map(([x, y]): [number, number] => [400_000 + x, 5_700_000 + y]);
    // Both loops are on the same side here, so the ring only touches itself; turned over, it runs through itself.
    expect(read(inSystem(25833, [moved])).value.report.parts).toBe(1);
    const through: [number, number][] = [
      [0, 0],
      [50, 50],
      [100, 100],
      [0, 100],
      [50, 50],
      [100, 0],
      [0, 0],
    ];
    expect(
      refused(inSystem(25833, [through.map(([x, y]): [number, number] => [400_000 + x, 5_700_000 + y])])).code,
    ).toBe("rings-cross");
  });

  test("a hole that touches its outer ring in a corner is fine", () => {
    const hole: [number, number][] = [
      [400_000, 5_700_000],
      [400_020, 5_700_010],
      [400_010, 5_700_020],
      [400_000, 5_700_000],
    ];
    expect(read(inSystem(25833, [outer, hole])).value.report.holes).toBe(1);
  });
});
