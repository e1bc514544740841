import { zipSync } from "fflate";
import { expect, test } from "vitest";
import { readBoundaryFile } from "#shared/exchange/read-file.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { bytesOf } from "./imports.ts";

const kml = (west: number): Uint8Array =>
  bytesOf(
    `<kml><Placemark><Polygon><outerBoundaryIs><LinearRing><coordinates>${west},53 ${west + 0.01},53 ${west},53.01 ${west},53</coordinates></LinearRing></outerBoundaryIs></Polygon></Placemark></kml>`,
  );

test("a KMZ is read like the KML in it", () => {
  const found = readBoundaryFile(zipSync({ "doc.kml": kml(9), "files/icon.png": bytesOf("PNG") }), {});
  expect(found).toMatchObject({ format: "KMZ", features: 1, crs: { text: "EPSG:4326" } });
  expect(found.polygons[0]?.[0]?.[0]).toEqual([9, 53]);
});

test("several KML files in it are asked for, and those left aside are told", () => {
  const zip = zipSync({ "north.kml": kml(9), "south.kml": kml(8) });
  expect(refusalOf(() => readBoundaryFile(zip, {})).question).toMatchObject({
    kind: "layer",
    layers: ["north.kml", "south.kml"],
  });
  const found = readBoundaryFile(zip, { layer: "south.kml" });
  expect(found.polygons[0]?.[0]?.[0]).toEqual([8, 53]);
  expect(found.ignored).toEqual(["Other files of the archive: north.kml."]);
});
