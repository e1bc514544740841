import { describe, expect, test } from "vitest";
import { readArea } from "#shared/exchange/read-area.ts";
import { readGpx } from "#shared/exchange/read-gpx.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { bytesOf, outside, outsideExists, textOf } from "./imports.ts";

const points = (tag: string, ...at: readonly (readonly [number, number])[]): string =>
  at.map(([lng, lat]) => `<${tag} lat="${lat}" lon="${lng}"><ele>12</ele></${tag}>`).join("");
const gpx = (content: string): string =>
  `<?xml version="1.0"?><gpx version="1.1" creator="a" xmlns="http://www.topografix.com/GPX/1/1">${content}</gpx>`;

/** A walk round a rectangle of 0.002° × 0.001°, in two pieces; its end lies 0.0001° north of its beginning. */
const walk = gpx(
  `<wpt lat="53" lon="9"/><trk><name>round the fen</name><trkseg>${points("trkpt", [9, 53], [9.002, 53])}</trkseg>` +
    `<trkseg>${points("trkpt", [9.002, 53.001], [9, 53.001], [9, 53.0001])}</trkseg></trk>` +
    `<rte>${points("rtept", [9, 53], [9.1, 53.1])}</rte>`,
);

describe("a GPX file", () => {
  test("gives its tracks and routes as lines, the pieces of a track joined and told", () => {
    const found = readGpx(walk);
    expect(found.lines.map(({ name, vertices }) => [name, vertices.length])).toEqual([
      ["round the fen", 5],
      ["route 1", 2],
    ]);
    expect(found.notes).toEqual(["“round the fen” is in 2 pieces; joined them in their order."]);
    expect(found).toMatchObject({ polygons: [], others: { points: 1, lines: 2 }, crs: { text: "EPSG:4326" } });
  });

  // 0.0001° of latitude is 11.1 m. The route has two points, so it cannot be closed and is not offered.
  test("asks which line to close, and says how far its ends lie apart", () => {
    const refused = refusalOf(() => readArea({ name: "w.gpx", bytes: bytesOf(walk) }, {}, {}));
    expect(refused.question).toMatchObject({
      kind: "lines",
      lines: [{ name: "round the fen", vertices: 5, gap: "its ends lie 11 m apart" }],
    });
  });

  // Sides of about 134 m (0.002° · 111 320 m · cos 53°) and 111.3 m: 1.49 ha on the sphere, within 1 %.
  test("is a study area once its line is closed, which the report tells", () => {
    const { report } = readArea({ name: "w.gpx", bytes: bytesOf(walk) }, { lines: [0] }, {}).value;
    expect(report.geodesicAreaM2 / 1e4).toBeCloseTo(1.49, 1);
    expect(report.mended).toContain("Closed “round the fen” to a boundary; its ends lie 11 m apart.");
    expect(report.vertices).toBe(5);
  });

  test("with a point that has no position is refused: nothing is left out silently", () => {
    const broken = walk.replace('lat="53.001" lon="9"', 'lat="" lon="9"');
    expect(refusalOf(() => readGpx(broken)).message).toMatch(/hold 7 points, but only 6 can be read/);
  });

  test("that declares entities is refused before it is parsed", () => {
    const bomb = `<!DOCTYPE gpx [<!ENTITY a "aaaa">]>${walk.replace(/<\?xml[^>]*>/, "")}`;
    expect(refusalOf(() => readGpx(bomb)).code).toBe("file-unsafe");
  });

  test("of other XML is refused by name", () => {
    expect(refusalOf(() => readGpx("<gpx-like/>")).message).toContain("gpx-like");
  });
});

// GDAL 3.6.2 reads 1 route (tg_trek.gpx), 40 waypoints (tg_wpt.gpx), an empty track (tg_empty_trk.gpx); placemark/togeojson, BSD-2.
describe.skipIf(!outsideExists)("files from elsewhere", () => {
  test.each([
    ["gpx/tg_trek.gpx", [["route 1", 120]], 0],
    ["gpx/tg_wpt.gpx", [], 40],
    ["gpx/tg_empty_trk.gpx", [], 0],
  ] as const)("%s", (name, lines, waypoints) => {
    const found = readGpx(textOf(outside(name)));
    expect(found.lines.map((line) => [line.name, line.vertices.length])).toEqual(lines);
    expect(found.others.points).toBe(waypoints);
  });
});
