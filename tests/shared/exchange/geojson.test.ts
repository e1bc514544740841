import { describe, expect, test } from "vitest";
import { boundaryText } from "#shared/exchange/boundary-text.ts";
import { readGeoJson } from "#shared/exchange/geojson.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { bytesOf, imported, outside, outsideExists } from "./imports.ts";

const square = [
  [
    [0, 0],
    [1, 0],
    [1, 1],
    [0, 1],
    [0, 0],
  ],
];
const read = (value: unknown) => readGeoJson(JSON.stringify(value));

describe("GeoJSON", () => {
  test("is read as a collection, a feature, or a bare geometry", () => {
    const polygon = { type: "Polygon", coordinates: square };
    const feature = { type: "Feature", properties: null, geometry: polygon };
    for (const root of [polygon, feature, { type: "FeatureCollection", features: [feature] }]) {
      expect(read(root)).toMatchObject({ format: "GeoJSON", features: 1, polygons: [square], heights: 0 });
    }
  });

  test("gives the polygons of multi-polygons and of collections within collections", () => {
    const inner = {
      type: "GeometryCollection",
      geometries: [
        { type: "Polygon", coordinates: square },
        { type: "Point", coordinates: [1, 2] },
      ],
    };
    const found = read({
      type: "GeometryCollection",
      geometries: [inner, { type: "MultiPolygon", coordinates: [square, square] }],
    });
    expect(found.polygons).toHaveLength(3);
    expect(found.others).toEqual({ points: 1, lines: 0, empty: 0 });
  });

  test("features without properties, null geometries and heights are counted, not refused", () => {
    const found = read({
      type: "FeatureCollection",
      features: [
        { type: "Feature", geometry: null },
        {
          type: "Feature",
          geometry: {
            type: "Polygon",
            coordinates: [
              [
                [0, 0, 5],
                [1, 0, 5],
                [1, 1, 5],
                [0, 0, 5],
              ],
            ],
          },
        },
      ],
    });
    expect(found).toMatchObject({ features: 2, heights: 4, others: { points: 0, lines: 0, empty: 1 } });
    expect(found.polygons[0]?.[0]?.[0]).toEqual([0, 0]);
  });

  test("a byte order mark and UTF-16 change nothing", () => {
    const plain = readGeoJson(boundaryText(imported("made/good_polygon_hole.geojson")));
    expect(readGeoJson(boundaryText(imported("made/utf8_bom.geojson")))).toEqual(plain);
    const text = `\uFEFF${boundaryText(imported("made/good_polygon_hole.geojson"))}`;
    const utf16 = new Uint8Array(Buffer.from(text, "utf16le"));
    expect(readGeoJson(boundaryText(utf16))).toEqual(plain);
  });

  test("without a crs member is in WGS 84, by the format's rule and not by the file", () => {
    expect(read({ type: "Polygon", coordinates: square }).crs).toMatchObject({
      kind: "stated",
      text: "EPSG:4326",
      byFile: false,
    });
  });

  test("with the older crs member is in the system that it names", () => {
    const found = readGeoJson(boundaryText(imported("made/old_crs_member_utm.geojson")));
    expect(found.crs).toMatchObject({ kind: "stated", text: "urn:ogc:def:crs:EPSG::32633", byFile: true });
  });

  test.each([
    null,
    {},
    { type: "link", properties: { href: "http://example.org/crs" } },
    { type: "name", properties: {} },
  ])("with a crs member of %j says nothing about its system", (crs) => {
    expect(read({ type: "Polygon", coordinates: square, crs }).crs.kind).toBe("missing");
  });
});

describe("a broken GeoJSON file", () => {
  test("is refused with the line where the JSON breaks", () => {
    const { code, message } = refusalOf(() =>
      readGeoJson('{\n "type": "Polygon",\n "coordinates": [[[0, 0], [1 0]]]\n}'),
    );
    expect(code).toBe("file-damaged");
    expect(message).toContain("line 3");
  });

  test("that is cut short is refused with its last line", () => {
    const { message } = refusalOf(() => readGeoJson('{\n "type": "Polygon",\n "coordinates": [[[0, 0],'));
    expect(message).toContain("line 3");
  });

  test.each([
    ["a list", [1, 2]],
    ["an object without a type", { features: [] }],
    ["a collection without features", { type: "FeatureCollection" }],
    ["a feature that is a number", { type: "FeatureCollection", features: [3] }],
    ["a geometry of an unknown kind", { type: "Circle", coordinates: [0, 0] }],
    ["coordinates that are text", { type: "Polygon", coordinates: [[["0", "0"]]] }],
    ["a vertex of one number", { type: "Polygon", coordinates: [[[0]]] }],
    ["coordinates that are no list", { type: "Polygon", coordinates: 5 }],
  ])("with %s is refused", (_, value) => {
    expect(refusalOf(() => read(value)).code).toBe("file-damaged");
  });

  test("that nests collections without end is refused", () => {
    let value: unknown = { type: "Point", coordinates: [0, 0] };
    for (let i = 0; i < 100; i++) value = { type: "GeometryCollection", geometries: [value] };
    expect(refusalOf(() => read(value)).code).toBe("file-unsafe");
  });

  test("that is not in UTF-8 is refused", () => {
    expect(refusalOf(() => boundaryText(new Uint8Array([0x7b, 0xe4, 0x7d]))).code).toBe("file-damaged");
    expect(boundaryText(bytesOf("{}"))).toBe("{}");
  });
});

// expected.json of the import files: GDAL 3.6.2. Where GDAL reads what RFC 7946 forbids, the file is refused here.
describe.skipIf(!outsideExists)("files of mapbox/geojsonhint", () => {
  test.each([
    ["gh_good_good-featurecollection", { features: 3, parts: 1, points: 1, lines: 1 }],
    ["gh_good_issue82", { features: 1, parts: 3, points: 0, lines: 0 }],
    ["gh_good_nullgeometry", { features: 1, parts: 0, points: 0, lines: 0 }],
    ["gh_good_good-multipoint", { features: 1, parts: 0, points: 1, lines: 0 }],
    ["gh_bad_bad-polygon-interiorring-rhr", { features: 1, parts: 1, points: 0, lines: 0 }],
    ["gh_bad_different-first-last", { features: 1, parts: 1, points: 0, lines: 0 }],
  ])("%s", (name, expected) => {
    const { features, polygons, others } = readGeoJson(boundaryText(outside(`geojson/${name}.geojson`)));
    expect({ features, parts: polygons.length, points: others.points, lines: others.lines }).toEqual(expected);
  });

  test.each([
    "bad-json",
    "featurecollection-obj",
    "featurecollection",
    "rootstring",
    "badcoordtype",
    "point-labeled-as-a-multipolygon",
  ])("gh_bad_%s is refused", (name) => {
    expect(refusalOf(() => readGeoJson(boundaryText(outside(`geojson/gh_bad_${name}.geojson`)))).code).toBe(
      "file-damaged",
    );
  });
});
