import fc from "fast-check";
import { zipSync } from "fflate";
import { describe, expect, test } from "vitest";
import { readBoundaryFile } from "#shared/exchange/read-file.ts";
import { Problem } from "#shared/problem.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { bytesOf, imported } from "./imports.ts";

const read = (bytes: Uint8Array) => readBoundaryFile(bytes, {});

describe("a boundary file is known by what is in it, not by its name", { timeout: 30_000 }, () => {
  test.each([
    ["made/good_polygon_hole.geojson", "GeoJSON"],
    ["made/zip_with_folder_and_mac_junk.zip", "Shapefile"],
    ["made/area.wkt", "WKT"],
  ])("%s is %s", (name, format) => {
    expect(read(imported(name)).format).toBe(format);
  });

  test.each([
    ["a web page", bytesOf("<!DOCTYPE html><html></html>"), /web page/],
    ["an archive with a GeoPackage", zipSync({ "a.gpkg": bytesOf("SQLite") }), /a\.gpkg/],
    ["a GeoPackage", bytesOf("SQLite format 3\0…"), /GeoPackage/],
    ["a JPEG", new Uint8Array([0xff, 0xd8, 0xff, 0xe0, 0, 0]), /image/],
    ["a gzip archive", new Uint8Array([0x1f, 0x8b, 8, 0]), /Unpack it/],
    ["bytes of no kind", new Uint8Array([1, 2, 3, 0, 9, 9]), /not text/],
  ])("%s is refused by name, with the kinds that are read", (_, bytes, named) => {
    const { code, message } = refusalOf(() => read(bytes));
    expect(code).toBe("file-unknown");
    expect(message).toMatch(named);
    expect(message).toContain("GeoJSON, a zipped shapefile, KML, KMZ, GeoPackage, GPX or WKT");
  });

  test("blanks are as good as nothing", () => {
    expect(refusalOf(() => read(bytesOf(" \n\t"))).code).toBe("file-empty");
  });
});

describe("a damaged file", { timeout: 30_000 }, () => {
  // Whatever a disk or a person did to a file, it is read or refused in words; it never fails without them.
  test.each(["made/good_polygon_hole.geojson", "made/zip_with_folder_and_mac_junk.zip", "wheat.zip"])(
    "%s with changed bytes is read or refused with a reason",
    (name) => {
      const whole = imported(name);
      const change = fc.tuple(fc.nat({ max: whole.length - 1 }), fc.nat({ max: 255 }));
      fc.assert(
        fc.property(
          fc.array(change, { minLength: 1, maxLength: 8 }),
          fc.nat({ max: whole.length }),
          (changes, length) => {
            const bytes = whole.slice(0, length % 3 === 0 ? length : whole.length);
            for (const [at, value] of changes) if (at < bytes.length) bytes[at] = value;
            try {
              read(bytes);
            } catch (error) {
              expect(error).toBeInstanceOf(Problem);
            }
          },
        ),
        { numRuns: 150 },
      );
    },
  );
});
