import { execFileSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import Database from "better-sqlite3";
import { afterAll, describe, expect, test } from "vitest";
import { readArea } from "#shared/exchange/read-area.ts";
import { epsgLookup } from "#server/jobs/epsg.ts";
import { readGeoPackage } from "#server/jobs/read-geopackage.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { imported, outside, outsideExists } from "../../shared/exchange/imports.ts";

const folder = mkdtempSync(join(tmpdir(), "quillet-gpkg-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const at = (name: string): string => join(folder, name);
const bytesAt = (name: string): Uint8Array => new Uint8Array(readFileSync(at(name)));

/** A GeoPackage that GDAL's ogr2ogr wrote from a reference file. */
function written(name: string, ...options: readonly string[]): string {
  const source = at("source.geojson");
  writeFileSync(source, imported("made/good_polygon_hole.geojson"));
  execFileSync("ogr2ogr", ["-f", "GPKG", ...options, at(name), source], { stdio: "pipe" });
  return at(name);
}

/** A change that somebody makes to the file with SQL, its triggers taken away first. */
function changed(name: string, sql: string): Uint8Array {
  const sqlite = new Database(at(name));
  sqlite.pragma("legacy_alter_table = ON");
  for (const trigger of sqlite.prepare("SELECT name FROM sqlite_master WHERE type = 'trigger'").pluck().all())
    sqlite.exec(`DROP TRIGGER "${String(trigger)}"`);
  sqlite.exec(sql);
  sqlite.close();
  return bytesAt(name);
}

describe("a GeoPackage", { timeout: 30_000 }, () => {
  test("that GDAL wrote is the area of the GeoJSON that it was made of", () => {
    written("one.gpkg", "-nln", "fen");
    const tools = { epsg: epsgLookup, geoPackage: readGeoPackage };
    const from = (bytes: Uint8Array) => readArea({ name: "f", bytes }, {}, tools).value;
    const [package_, geojson] = [from(bytesAt("one.gpkg")), from(imported("made/good_polygon_hole.geojson"))];
    expect(package_.area).toEqual(geojson.area);
    expect(package_.report).toMatchObject({
      format: "GeoPackage",
      crs: { epsg: 4326, howKnown: "the GeoPackage's own table of systems (EPSG 4326)" },
    });
  });

  test("in another system says it, and heights are counted", () => {
    written("utm.gpkg", "-t_srs", "EPSG:25833", "-dim", "XYZ");
    const found = readGeoPackage(bytesAt("utm.gpkg"), {});
    expect(found.crs).toMatchObject({ text: "EPSG:25833" });
    expect(found.heights).toBeGreaterThan(0);
  });

  test("with two layers asks which", () => {
    written("two.gpkg", "-nln", "fen");
    execFileSync("ogr2ogr", ["-append", "-nln", "zone", at("two.gpkg"), at("source.geojson")], { stdio: "pipe" });
    expect(refusalOf(() => readGeoPackage(bytesAt("two.gpkg"), {})).question).toMatchObject({
      kind: "layer",
      layers: ["fen", "zone"],
    });
    expect(readGeoPackage(bytesAt("two.gpkg"), { layer: "zone" }).ignored).toEqual(["Other layers of the file: fen."]);
  });

  test("with a feature that has no geometry counts it", () => {
    written("null.gpkg", "-nln", "fen");
    const found = readGeoPackage(changed("null.gpkg", "INSERT INTO fen (fid, geom) VALUES (99, NULL)"), {});
    expect(found).toMatchObject({ features: 2, others: { empty: 1 } });
  });
});

describe("an untrusted file", { timeout: 30_000 }, () => {
  // A view in the place of the layer would run whatever SQL its maker wrote.
  test("a view is no layer", () => {
    written("view.gpkg", "-nln", "fen");
    const sql = "ALTER TABLE fen RENAME TO hidden; CREATE VIEW fen AS SELECT fid, geom FROM hidden";
    expect(refusalOf(() => readGeoPackage(changed("view.gpkg", sql), {})).code).toBe("area-none");
  });

  test("a geometry that is none is refused with its place", () => {
    written("bad.gpkg", "-nln", "fen");
    const bytes = changed("bad.gpkg", "UPDATE fen SET geom = x'47500001E6100000FF'");
    expect(refusalOf(() => readGeoPackage(bytes, {})).message).toMatch(/^Feature 1 of “fen” cannot be read/);
  });

  test("a database of another kind, one cut short, and text under that name are refused", () => {
    const plain = new Database(at("plain.sqlite"));
    plain.exec("CREATE TABLE a (b)");
    plain.close();
    expect(refusalOf(() => readGeoPackage(bytesAt("plain.sqlite"), {})).code).toBe("file-unknown");
    written("short.gpkg");
    expect(refusalOf(() => readGeoPackage(bytesAt("short.gpkg").subarray(0, 40_000), {})).code).toBe("file-damaged");
    expect(refusalOf(() => readGeoPackage(new TextEncoder().encode("SQLite format 3?"), {})).code).toBe("file-damaged");
  });
});

// GDAL 3.6.2 reads 100 multipolygons of 108 parts and 2529 vertices, EPSG:4267 (R package sf, GPL-2 or MIT).
test.skipIf(!outsideExists)("a file from elsewhere is read as GDAL reads it", () => {
  const found = readGeoPackage(outside("gpkg/nc.gpkg"), {});
  expect([found.features, found.polygons.length, found.polygons.flat(2).length]).toEqual([100, 108, 2529]);
  expect(found.crs).toMatchObject({ text: "EPSG:4267" });
  expect(refusalOf(() => readGeoPackage(outside("gpkg/nospatial.gpkg"), {})).code).toBe("area-none");
});
