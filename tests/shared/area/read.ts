import { epsgLookup } from "#server/jobs/epsg.ts";
import type { AreaAnswers } from "#shared/area/questions.ts";
import { readArea, type AreaRead } from "#shared/exchange/read-area.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import type { Problem } from "#shared/problem.ts";

export type Vertices = readonly (readonly [number, number])[];

export const geojson = (...polygons: (readonly Vertices[])[]): Uint8Array =>
  new TextEncoder().encode(
    JSON.stringify({
      type: "FeatureCollection",
      features: polygons.map((coordinates) => ({
        type: "Feature",
        properties: null,
        geometry: { type: "Polygon", coordinates },
      })),
    }),
  );

/** The same, in a projected system named by the older crs member. */
export const inSystem = (epsg: number, ...polygons: (readonly Vertices[])[]): Uint8Array => {
  const plain = JSON.parse(new TextDecoder().decode(geojson(...polygons))) as Record<string, unknown>;
  return new TextEncoder().encode(
    JSON.stringify({ ...plain, crs: { type: "name", properties: { name: `EPSG:${epsg}` } } }),
  );
};

export const read = (bytes: Uint8Array, answers: AreaAnswers = {}, name = "area"): AreaRead =>
  readArea({ name, bytes }, answers, { epsg: epsgLookup });
export const refused = (bytes: Uint8Array, answers: AreaAnswers = {}): Problem => refusalOf(() => read(bytes, answers));

/** A closed counter-clockwise rectangle. */
export const box = (west: number, south: number, east: number, north: number): Vertices => [
  [west, south],
  [east, south],
  [east, north],
  [west, north],
  [west, south],
];
