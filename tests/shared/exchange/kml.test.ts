import { describe, expect, test } from "vitest";
import { boundaryText } from "#shared/exchange/boundary-text.ts";
import { readKml } from "#shared/exchange/kml.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { imported, outside, outsideExists } from "./imports.ts";

const OUTER = "14.25,51.55,10 14.26,51.55,10 14.26,51.558,10 14.25,51.558,10 14.25,51.55,10";
const ring = (coordinates: string) => `<LinearRing><coordinates>${coordinates}</coordinates></LinearRing>`;
const polygon = (...rings: string[]) =>
  `<Polygon>${rings.map((text, i) => (i === 0 ? `<outerBoundaryIs>${ring(text)}</outerBoundaryIs>` : `<innerBoundaryIs>${ring(text)}</innerBoundaryIs>`)).join("")}</Polygon>`;
const document = (body: string) =>
  `<?xml version="1.0" encoding="UTF-8"?>\n<kml xmlns="http://www.opengis.net/kml/2.2"><Document>${body}</Document></kml>`;
const placemark = (body: string) => `<Placemark><name>a</name>${body}</Placemark>`;

describe("KML", () => {
  test("gives polygons with holes, in WGS 84, heights counted", () => {
    const hole = "14.253,51.552 14.253,51.554 14.256,51.554 14.253,51.552";
    const found = readKml(document(placemark(polygon(OUTER, hole))));
    expect(found).toMatchObject({
      format: "KML",
      features: 1,
      heights: 5,
      mended: [],
      ignored: [],
      crs: { text: "EPSG:4326" },
    });
    expect(found.polygons[0]?.map((vertices) => vertices.length)).toEqual([5, 4]);
    expect(found.polygons[0]?.[0]?.[1]).toEqual([14.26, 51.55]);
  });

  test("gives all polygons of folders and of multi-geometries", () => {
    const multi = `<MultiGeometry>${polygon(OUTER)}<Point><coordinates>14,51</coordinates></Point>${polygon(OUTER)}</MultiGeometry>`;
    const found = readKml(document(`<Folder>${placemark(multi)}${placemark(polygon(OUTER))}</Folder>`));
    expect(found.polygons).toHaveLength(3);
    expect(found.others.points).toBe(1);
  });

  test("an open ring is closed and told; a ring of two corners is left aside and told", () => {
    const found = readKml(document(placemark(polygon("14,51 15,51 15,52 14,52", "14.2,51.2 14.3,51.2"))));
    expect(found.mended).toEqual(["1 ring was open; closed it."]);
    expect(found.ignored).toEqual(["1 ring with fewer than three corners left aside."]);
    expect(found.polygons[0]).toHaveLength(1);
  });
});

describe("a hostile or broken KML", () => {
  test("with entity declarations is refused before it is parsed", () => {
    const { code, message } = refusalOf(() => readKml(boundaryText(imported("made/entities.kml"))));
    expect(code).toBe("file-unsafe");
    expect(message).not.toContain("aaaaaaaaaa");
  });

  test("cannot hide a declaration behind comments and instructions", () => {
    const hidden = `<?xml version="1.0"?>\n<!-- a --><?b c?>\n<!-- d -->\n<!DOCTYPE kml [<!ENTITY a "b">]>${document("").slice(38)}`;
    expect(refusalOf(() => readKml(hidden)).code).toBe("file-unsafe");
  });

  test("may speak of a document type in a description", () => {
    const description = "<description><![CDATA[<!DOCTYPE html><html>…</html>]]></description>";
    expect(readKml(document(`<Placemark>${description}${polygon(OUTER)}</Placemark>`)).polygons).toHaveLength(1);
  });

  test("that is cut short is refused", () => {
    const whole = document(placemark(polygon(OUTER)));
    for (const length of [60, 150, whole.length - 30, whole.length - 3]) {
      expect(refusalOf(() => readKml(whole.slice(0, length))).code, `${length} letters`).toBe("file-damaged");
    }
  });

  test("with vertices that are not numbers is refused, not read without them", () => {
    expect(refusalOf(() => readKml(document(placemark(polygon("14,51 x,51 15,52 14,52 14,51"))))).code).toBe(
      "file-damaged",
    );
  });

  test("whose polygons the converter overlooks is refused with the numbers", () => {
    const prefixed = `<k:kml xmlns:k="http://www.opengis.net/kml/2.2"><k:Placemark><k:Polygon><k:outerBoundaryIs><k:LinearRing><k:coordinates>${OUTER}</k:coordinates></k:LinearRing></k:outerBoundaryIs></k:Polygon></k:Placemark></k:kml>`;
    const { code, message } = refusalOf(() => readKml(prefixed));
    expect(code).toBe("file-damaged");
    expect(message).toContain("1 rings of polygons, but only 0");
  });

  test("that is other XML is refused by the name of its outermost element", () => {
    expect(refusalOf(() => readKml("<svg xmlns='http://www.w3.org/2000/svg'/>")).message).toContain("svg");
  });
});

// expected.json of the import files: what GDAL 3.6.2 reads.
describe.skipIf(!outsideExists)("files of other programs", () => {
  test.each([
    ["gis_InnerBoundaryPoly-Pentagon.kml", 1, 1, 12],
    ["gis_polygon-point.kml", 1, 0, 41],
    ["gis_treasureIsland.kml", 1, 0, 51],
    ["tg_polygon.kml", 1, 1, 10],
    ["tg_cdata.kml", 0, 0, 0],
    ["tg_multigeometry.kml", 0, 0, 0],
    ["tg_null_geometry.kml", 0, 0, 0],
    ["gis_emptyGeom.kml", 0, 0, 0],
    ["gis_NestedMultiGeoms.kml", 0, 0, 0],
  ])("%s gives %d parts, %d holes, %d vertices", (name, parts, holes, vertices) => {
    const { polygons } = readKml(boundaryText(outside(`kml/${name}`)));
    expect([polygons.length, polygons.flat().length - polygons.length, polygons.flat(2).length]).toEqual([
      parts,
      holes,
      vertices,
    ]);
  });

  test.each(["tg_bad.kml", "gis_sloppy_badAtom.kml"])("%s is refused, since it is broken", (name) => {
    expect(refusalOf(() => readKml(boundaryText(outside(`kml/${name}`)))).code).toBe("file-damaged");
  });
});
