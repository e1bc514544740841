import { createHash } from "node:crypto";
import { describe, expect, test } from "vitest";
import * as z from "zod";
import { importReport } from "#shared/api/area.ts";
import { imported, outside, outsideExists } from "../exchange/imports.ts";
import { read, refused } from "./read.ts";

const made = (name: string): Uint8Array => imported(`made/${name}`);

describe("a good boundary file", { timeout: 30_000 }, () => {
  test("gives the area and a report with all counts, the hash of the bytes, and how the system was known", () => {
    const bytes = made("good_polygon_hole.geojson");
    const { value } = read(bytes, {}, "good.geojson");
    expect(value.report).toMatchObject({
      format: "GeoJSON",
      fileName: "good.geojson",
      bytes: 322,
      sha256: createHash("sha256").update(bytes).digest("hex"),
      crs: { name: "WGS 84", epsg: 4326, howKnown: "GeoJSON is in longitude and latitude of WGS 84 (RFC 7946)" },
      features: 1,
      parts: 1,
      rings: 2,
      holes: 1,
      vertices: 8,
      bounds: [14.25, 51.55, 14.26, 51.558],
      mended: [],
      ignored: [],
    });
    // By hand: at 51.554° a degree is 69 347 m × 111 266 m; 0.01 × 0.008 less 0.003 × 0.002 of it is 571 000 m².
    expect(value.report.geodesicAreaM2 / 1000).toBeCloseTo(571, -1);
    expect(value.area.polygons[0]?.[0]).toHaveLength(4);
  });

  test("has a report of the shape that the API promises", () => {
    const { report } = read(made("good_polygon_hole.geojson")).value;
    expect(z.parse(importReport, report)).toEqual(report);
  });

  test("with a byte order mark reads as without", () => {
    expect(read(made("utf8_bom.geojson")).value.area).toEqual(read(made("good_polygon_hole.geojson")).value.area);
  });

  test("whose ring is open is closed, and that is told", () => {
    const { area, report } = read(made("unclosed.geojson")).value;
    expect(report.mended).toEqual(["1 ring was open; closed with a straight edge."]);
    expect(area.polygons[0]?.[0]).toHaveLength(4);
  });

  test("in the system of an older crs member is read in that system, never as degrees", () => {
    const { area, report } = read(made("old_crs_member_utm.geojson")).value;
    expect(report.crs).toMatchObject({ epsg: 32633, name: "WGS 84 / UTM zone 33N" });
    expect(area.polygons[0]?.[0]).toContainEqual([431_220, 5_712_400]);
    // Half of 1 km × 1 km, scale of areas there 0.9996² × (1 + (68.3 km/6379 km)²) = 0.99932, so 500 342 m² of ground.
    expect(report.geodesicAreaM2).toBeGreaterThan(500_300);
    expect(report.geodesicAreaM2).toBeLessThan(500_400);
  });

  // Two states of 176 000 and 250 000 km²; GDAL counts 2 features and 28 parts in it.
  test("in a zipped folder with a file manager's leftovers is read, and its great size is told", () => {
    const { report } = read(made("zip_with_folder_and_mac_junk.zip")).value;
    expect(report).toMatchObject({ format: "Shapefile", features: 2, parts: 28, holes: 0 });
    expect(report.notes.join(" ")).toMatch(/28 polygons taken together/);
    expect(report.notes.join(" ")).toMatch(/4\d\d,\d{3} km²/);
  });

  test("of 500 plots that share edges is one study area", () => {
    const { area, report } = read(imported("wheat.zip"), { crs: "EPSG:32633" }).value;
    expect(area.polygons).toHaveLength(500);
    expect(report.notes).toContain(
      "500 polygons taken together as one study area; edges that they share are dissolved.",
    );
    expect(report.crs.howKnown).toBe("told at import, since the file does not say it");
  });
});

describe.skipIf(!outsideExists)("files of other programs", { timeout: 30_000 }, () => {
  // expected.json: areas of the two on the equal-area plane of EPSG:5070, as GDAL computes them. The edges, up to 20 km long,
  // are straight in a different system each time, so the areas are not quite the same.
  test("two counties in six systems have the same area on the ellipsoid to one part in 10,000", () => {
    const areas = [
      "crs_conus_albers",
      "crs_utm18_nad83",
      "crs_web_mercator",
      "crs_us_survey_feet_nc",
      "crs_prj_bom_crlf",
      "crs_polygonz",
    ].map((name) => read(outside(`shapefile/${name}.zip`)).value.report.geodesicAreaM2);
    for (const area of areas) expect(Math.abs(area / (943_920_756 + 1_678_060_537) - 1)).toBeLessThan(1e-4);
  });

  test("NAD27 is refused by name", () => {
    expect(refused(outside("shapefile/nc.zip")).code).toBe("crs-unsupported");
  });
});
