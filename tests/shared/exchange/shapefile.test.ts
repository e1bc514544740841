import { zipSync } from "fflate";
import { describe, expect, test } from "vitest";
import { readShp, readZippedShapefile } from "#shared/exchange/shapefile.ts";
import { listZip } from "#shared/exchange/zip.ts";
import { crsFromText } from "#shared/projection/crs.ts";
import { transformer, WGS84 } from "#shared/projection/transformer.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { bytesOf, imported, outside, outsideExists } from "./imports.ts";
import { makeShp, rectangle } from "./make-shapefile.ts";

const read = (zip: Uint8Array, layer?: string) => readZippedShapefile(zip, listZip(zip), { layer });
const shp = makeShp([[rectangle(0, 0, 10, 10)]]);

describe("a zipped shapefile", { timeout: 30_000 }, () => {
  // expected.json of the import files: GDAL reads 2 features, 28 parts, no holes, 1731 vertices; first vertex as stored.
  test("in a folder with a file manager's leftovers is one layer", () => {
    const found = read(imported("made/zip_with_folder_and_mac_junk.zip"));
    expect(found).toMatchObject({ format: "Shapefile", features: 2, others: { points: 0, lines: 0, empty: 0 } });
    expect(found.polygons).toHaveLength(28);
    expect(found.polygons.flat(2)).toHaveLength(1731);
    expect(found.polygons[0]?.[0]?.[0]).toEqual([-123.93146540306438, 46.23892415059257]);
    expect(found.crs).toMatchObject({ kind: "stated", byFile: true });
  });

  test("of 500 plots without a .prj says that the system is missing", () => {
    const found = read(imported("wheat.zip"));
    expect([found.features, found.polygons.length, found.polygons.flat(2).length]).toEqual([500, 500, 2500]);
    expect(found.polygons[0]?.[0]?.[0]).toEqual([1.255, 64.05]);
    expect(found.crs).toEqual({ kind: "missing", why: "The shapefile “wheat” comes without its .prj file." });
  });

  test("of several layers is a question that the next request answers", () => {
    const { code, question } = refusalOf(() => read(imported("made/zip_two_layers.zip")));
    expect(code).toBe("area-question");
    expect(question).toMatchObject({ kind: "layer", layers: ["ms_two_states", "other/second"] });
    const found = read(imported("made/zip_two_layers.zip"), "other/second");
    expect(found.polygons).toHaveLength(28);
    expect(found.ignored).toEqual(["Other layers of the archive: ms_two_states."]);
  });

  test("whose parts differ in case belongs together, and needs no .dbf", () => {
    const found = read(zipSync({ "AREA.SHP": shp, "Area.prj": bytesOf("EPSG:25833") }));
    expect(found.crs).toMatchObject({ kind: "stated", text: "EPSG:25833" });
  });

  test("with an empty .prj says so", () => {
    expect(read(zipSync({ "a.shp": shp, "a.prj": bytesOf(" \r\n") })).crs).toMatchObject({ kind: "missing" });
  });

  test("without a .shp is refused by name", () => {
    const { code, message } = refusalOf(() => read(imported("made/zip_without_shp.zip")));
    expect(code).toBe("file-unknown");
    expect(message).toContain("no .shp");
  });

  test("cut short is refused: never half an area", () => {
    const { code, message } = refusalOf(() => read(imported("made/zip_shp_cut_short.zip")));
    expect(code).toBe("file-damaged");
    expect(message).toContain("28012 bytes long and has 14006");
  });
});

describe("the records of a .shp", { timeout: 30_000 }, () => {
  test("are refused at any shorter length", () => {
    const whole = makeShp([[rectangle(0, 0, 1, 1)], [rectangle(2, 0, 3, 1)]]);
    expect(readShp(whole, "a").polygons).toHaveLength(2);
    for (let length = 0; length < whole.length; length += 4) {
      expect(refusalOf(() => readShp(whole.subarray(0, length), "a")).code, `${length} bytes`).toBe("file-damaged");
    }
  });

  // A header that was shortened together with the file hides the cut from the first check: the record's own length shows it.
  test("are refused when the header is shortened with the file", () => {
    const cut = makeShp([[rectangle(0, 0, 1, 1)], [rectangle(2, 0, 3, 1)]]).slice(0, 300);
    new DataView(cut.buffer).setInt32(24, 150);
    expect(refusalOf(() => readShp(cut, "a")).code).toBe("file-damaged");
  });

  test("that state more points than fit are refused", () => {
    const lying = shp.slice();
    new DataView(lying.buffer).setInt32(108 + 40, 1_000_000, true);
    expect(refusalOf(() => readShp(lying, "a")).message).toContain("1000000 points");
  });

  test("are polygons with holes by the direction of their rings", () => {
    const found = readShp(
      makeShp([[rectangle(0, 0, 10, 10), rectangle(2, 2, 4, 4, false), rectangle(20, 0, 30, 10)]]),
      "a",
    );
    expect(found.polygons.map((polygon) => polygon.length)).toEqual([2, 1]);
  });

  // A field with an angle-shaped island in an angle-shaped pond, and a second pond that lies in the island's box, but not in the island.
  test("give a hole to the ring that holds it, not to the one whose box does", () => {
    const angle = (grow: number): [number, number][] => {
      const [near, far, inner] = [10 - grow, 90 + grow, 20 + grow];
      return [
        [near, near],
        [near, far],
        [far, far],
        [far, far - 10 - 2 * grow],
        [inner, far - 10 - 2 * grow],
        [inner, near],
        [near, near],
      ];
    };
    const pond = angle(2).toReversed();
    const second = rectangle(50, 50, 60, 60, false);
    const found = readShp(makeShp([[rectangle(0, 0, 100, 100), pond, angle(0), second]]), "a");
    const holes = found.polygons.map((polygon) => polygon.slice(1).map((ring) => ring[0]));
    expect(holes).toEqual([[pond[0], second[0]], []]);
  });

  test("with a hole in no outer ring are refused, since the parser would drop it", () => {
    const { code, message } = refusalOf(() =>
      readShp(makeShp([[rectangle(0, 0, 1, 1), rectangle(5, 5, 6, 6, false)]]), "a"),
    );
    expect(code).toBe("file-damaged");
    expect(message).toContain("holds 2 rings");
  });

  test("that are null are counted", () => {
    expect(readShp(makeShp([null, [rectangle(0, 0, 1, 1)]]), "a")).toMatchObject({ features: 2, others: { empty: 1 } });
  });

  test("with coordinates that are marks for no data are refused", () => {
    expect(
      refusalOf(() =>
        readShp(
          makeShp([
            [
              [
                [-1.7976931348623157e308, 0],
                [1, 0],
                [1, 1],
                [-1.7976931348623157e308, 0],
              ],
            ],
          ]),
          "a",
        ),
      ).code,
    ).toBe("file-damaged");
  });

  test("that are no .shp at all are refused", () => {
    expect(refusalOf(() => readShp(new Uint8Array(200), "a")).code).toBe("file-damaged");
  });
});

// expected.json of the import files: GDAL 3.6.2, first vertex of the first polygon as stored and in WGS 84.
describe.skipIf(!outsideExists)("shapefiles in other systems", { timeout: 30_000 }, () => {
  test.each([
    ["crs_conus_albers", -75.78317260742188, 36.225193023681655],
    ["crs_utm18_nad83", -75.78317260742188, 36.225193023681655],
    ["crs_web_mercator", -75.78317260742188, 36.22519302368163],
    ["crs_us_survey_feet_nc", -75.78317260742188, 36.22519302368163],
    ["crs_prj_bom_crlf", -75.78317260742188, 36.22519302368164],
    ["crs_polygonz", -75.78317260742188, 36.22519302368164],
    ["ms166_a_utm", -74.06334802504881, 40.61628999878977],
    ["ms_two_states_mercator", -123.93146540306438, 46.238924150592574],
  ])("%s lands where GDAL puts it, to a tenth of a millimetre", (name, lng, lat) => {
    const found = read(outside(`shapefile/${name}.zip`));
    if (found.crs.kind !== "stated") throw new RangeError("no .prj");
    const first = found.polygons[0]?.[0]?.[0] ?? [0, 0];
    const place = transformer(crsFromText(found.crs.text), WGS84).forward(first);
    expect(Math.abs(place[0] - lng)).toBeLessThan(1e-9);
    expect(Math.abs(place[1] - lat)).toBeLessThan(1e-9);
  });

  test.each(["crs_no_prj", "crs_no_prj_lonlat"])("%s is asked, never assumed", (name) => {
    expect(read(outside(`shapefile/${name}.zip`)).crs.kind).toBe("missing");
  });

  test("nc in NAD27 is refused, since reading it as WGS 84 would be 18 m wrong", () => {
    const found = read(outside("shapefile/nc.zip"));
    expect(found.polygons).toHaveLength(108);
    expect(found.polygons.flat(2)).toHaveLength(2529);
    if (found.crs.kind !== "stated") throw new RangeError("no .prj");
    const { text } = found.crs;
    expect(refusalOf(() => crsFromText(text)).code).toBe("crs-unsupported");
  });
});
