import { zipSync } from "fflate";
import { describe, expect, test } from "vitest";
import { imported } from "../exchange/imports.ts";
import { makeShp, rectangle } from "../exchange/make-shapefile.ts";
import { box, geojson, inSystem, read, refused } from "./read.ts";

const made = (name: string): Uint8Array => imported(`made/${name}`);

describe("what a file leaves open is asked, and the answer settles it", { timeout: 30_000 }, () => {
  test("metres without a system", () => {
    const { code, question } = refused(made("metres_no_crs.geojson"));
    expect([code, question?.kind, question?.["looksLike"]]).toEqual(["area-question", "crs", "metres"]);
    const { report } = read(made("metres_no_crs.geojson"), { crs: "25833" }).value;
    expect(report.crs).toMatchObject({ epsg: 25833, howKnown: "told at import" });
  });

  test("a shapefile without its .prj", () => {
    const zip = zipSync({ "a.shp": makeShp([[rectangle(14.25, 51.55, 14.26, 51.56)]]) });
    const { code, question } = refused(zip);
    expect([code, question?.kind, question?.["looksLike"]]).toEqual(["area-question", "crs", "degrees"]);
    expect(read(zip, { crs: "EPSG:4326" }).value.report.bounds).toEqual([14.25, 51.55, 14.26, 51.56]);
  });

  test("several layers", () => {
    expect(refused(made("zip_two_layers.zip")).question).toMatchObject({
      kind: "layer",
      layers: ["ms_two_states", "other/second"],
    });
    expect(read(made("zip_two_layers.zip"), { layer: "other/second" }).value.report.features).toBe(2);
  });

  test("a crs member that is null", () => {
    const unknown = JSON.parse(new TextDecoder().decode(geojson([box(14, 51, 14.1, 51.1)]))) as object;
    const bytes = new TextEncoder().encode(JSON.stringify({ ...unknown, crs: null }));
    expect(refused(bytes).question).toMatchObject({ kind: "crs", looksLike: "degrees" });
    expect(read(bytes, { crs: "EPSG:4258" }).value.report.crs.epsg).toBe(4258);
  });

  test("degrees in a file that says it is in metres", () => {
    const { code, question } = refused(inSystem(25833, [box(14, 51, 14.1, 51.1)]));
    expect([code, question?.["looksLike"]]).toEqual(["area-question", "degrees"]);
  });

  test("a system that cannot be converted may be told in another way", () => {
    const bytes = inSystem(31467, [box(3_500_000, 5_500_000, 3_500_100, 5_500_100)]);
    const { code, question } = refused(bytes);
    expect([code, question?.kind]).toEqual(["crs-unsupported", "crs"]);
    const proj =
      "+proj=tmerc +lat_0=0 +lon_0=9 +k=1 +x_0=3500000 +y_0=0 +ellps=bessel +towgs84=598.1,73.7,418.2,0.202,0.045,-2.455,6.7 +units=m";
    const { report } = read(bytes, { crs: proj }).value;
    expect(report.crs.howKnown).toMatch(/^told at import, in place of what the file says/);
    expect(report.notes.join()).toMatch(/seven parameters/);
  });

  test("an answer that the file does not need is not used, and that is told", () => {
    const { report } = read(made("old_crs_member_utm.geojson"), { crs: "EPSG:25832" }).value;
    expect(report.crs.epsg).toBe(32633);
    expect(report.notes.join()).toContain("was not needed and not used");
    expect(read(made("old_crs_member_utm.geojson"), { crs: "EPSG:32633" }).value.report.notes).toEqual([]);
  });

  test("a system far from its place is told", () => {
    const { report } = read(made("metres_no_crs.geojson"), { crs: "EPSG:25830" }).value;
    expect(report.notes).toEqual([]);
    const far = read(inSystem(2193, [box(1_000_000, 1_000_000, 1_001_000, 1_001_000)])).value.report;
    expect(far.notes.join()).toContain("outside the place that NZGD2000");
  });
});
