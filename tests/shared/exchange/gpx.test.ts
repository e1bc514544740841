import { execFileSync, spawnSync } from "node:child_process";
import { readdirSync } from "node:fs";
import { fileURLToPath } from "node:url";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { writeGpx, type Waypoint } from "#shared/exchange/gpx.ts";

const reference = (path: string) => fileURLToPath(new URL(`../../reference/${path}`, import.meta.url));
const schema = reference("schemas/gpx.xsd");
const SCHEMA_CHECK = ["--nonet", "--noout", "--schema", schema];

/** xmllint's verdict on the published GPX 1.1 schema; throws its words where the file is not valid. */
const validate = (gpx: string) =>
  execFileSync("xmllint", [...SCHEMA_CHECK, "-"], { input: gpx, stdio: ["pipe", "pipe", "pipe"] });

const meta = { name: "Holm of Skerrow", description: "60 picks, 57 cells to visit", time: "2031-05-04T06:00:00Z" };
const point = (change: Partial<Waypoint> = {}): Waypoint => ({
  lng: 147.33,
  lat: -42.88,
  name: "A1",
  comment: "unit 1",
  description: "",
  ...change,
});
const write = (...waypoints: Waypoint[]) => writeGpx(waypoints, meta).value;

describe("the schema check itself", () => {
  test.each(readdirSync(reference("gpx")))("%s is valid only if it should be", (name) => {
    const { status } = spawnSync("xmllint", [...SCHEMA_CHECK, reference(`gpx/${name}`)]);
    expect(status === 0).toBe(!name.startsWith("bad_"));
  });
});

describe("waypoints as GPX 1.1", { timeout: 60_000 }, () => {
  test("are valid by the published schema", () => {
    validate(
      write(point(), point({ name: "B2", description: "corner", symbol: "Flag, Blue" }), point({ lat: 0, lng: -180 })),
    );
    validate(write());
  });

  test("child elements stand in the order that the schema wants, empty ones are left out", () => {
    expect(write(point({ description: "d", symbol: "s" }))).toContain(
      '<wpt lat="-42.8800000" lon="147.3300000"><name>A1</name><cmt>unit 1</cmt><desc>d</desc><sym>s</sym></wpt>',
    );
    expect(write(point({ comment: "" }))).toContain('<wpt lat="-42.8800000" lon="147.3300000"><name>A1</name></wpt>');
  });

  // JavaScript prints 1e-7 with an exponent, which the schema refuses.
  test("coordinates have seven decimals and no exponent", () => {
    expect(write(point({ lat: 1e-7, lng: -1e-9 }))).toContain('lat="0.0000001" lon="0.0000000"');
  });

  // Longitude is below 180, after rounding too.
  test.each([180, 179.99999999, -180])("a longitude of %d is written -180", (lng) => {
    const gpx = write(point({ lng }));
    expect(gpx).toContain('lon="-180.0000000"');
    validate(gpx);
  });

  test.each([{ lat: 90.1 }, { lat: Number.NaN }, { lng: 180.1 }, { lng: Infinity }])(
    "%o is not on the globe: a bug, told",
    (place) => {
      expect(() => write(point(place))).toThrow(RangeError);
    },
  );

  test.each(["2031-05-04 06:00", "2031-05-04T06:00:00", "2031-05-04T06:00:00+02:00"])(
    "%s is no time in UTC: a bug, told",
    (time) => expect(() => writeGpx([], { ...meta, time })).toThrow("not a time in UTC"),
  );

  test("signs of XML are escaped", () => {
    const gpx = write(point({ name: "A&B", comment: `<i> "x" 'y' ]]>` }));
    expect(gpx).toContain("<name>A&amp;B</name><cmt>&lt;i&gt; &quot;x&quot; &apos;y&apos; ]]&gt;</cmt>");
    validate(gpx);
  });

  // XML 1.0 has no U+0000 … U+001F but tab and line ends, no lone surrogates, no U+FFFE.
  test("what XML cannot hold is left out and counted", () => {
    const written = writeGpx([point({ comment: "a\u0000b\u000bc\ud800d\ufffee\tf 🐦" })], meta);
    expect(written.value).toContain("<cmt>abcde\tf 🐦</cmt>");
    expect(written.notes).toEqual(["Characters that a GPX file cannot hold were left out: 4."]);
    expect(writeGpx([point()], meta).notes).toEqual([]);
    validate(written.value);
  });

  test("any text and any place gives a valid file, in the order given", () => {
    const text = fc.string({ unit: "binary", maxLength: 20 });
    const places = fc.record({
      lng: fc.double({ min: -180, max: 180, noNaN: true }),
      lat: fc.double({ min: -90, max: 90, noNaN: true }),
      name: text,
      comment: text,
      description: text,
      symbol: text,
    });
    fc.assert(
      fc.property(fc.array(places, { minLength: 200, maxLength: 300 }), (waypoints) => {
        const gpx = write(...waypoints);
        validate(gpx);
        const latitudes = [...gpx.matchAll(/<wpt lat="([^"]+)"/g)].map((found) => Number(found[1]));
        expect(latitudes).toHaveLength(waypoints.length);
        latitudes.forEach((lat, i) => expect(Math.abs(lat - (waypoints[i]?.lat ?? NaN))).toBeLessThan(1e-7));
      }),
      { numRuns: 10 },
    );
  });
});
