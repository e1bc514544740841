import { readFileSync } from "node:fs";
import * as z from "zod";

const file = (name: string): unknown =>
  JSON.parse(readFileSync(new URL(`../../reference/projection/${name}`, import.meta.url), "utf8"));

export const points = z
  .object({
    rows: z.array(
      z.object({
        epsg: z.number(),
        name: z.string(),
        lon: z.number(),
        lat: z.number(),
        proj4_string: z.string(),
        E_cs2cs: z.coerce.number(),
        N_cs2cs: z.coerce.number(),
        diff_npm_vs_cs2cs_samestring_mm: z.number(),
      }),
    ),
  })
  .parse(file("points.json")).rows;

export const geodesicAreas = z
  .object({
    rows: z.array(
      z.object({
        id: z.string(),
        geodesic_area_m2: z.number(),
        projected_crs: z.string(),
        projected_over_geodesic: z.number(),
      }),
    ),
  })
  .parse(file("geodesic_areas.json")).rows;

const coordinates = z.array(z.array(z.array(z.tuple([z.number(), z.number()]))));
const boundary = z.object({
  features: z.array(
    z.object({
      geometry: z.union([
        z.object({ type: z.literal("Polygon"), coordinates: coordinates.element }),
        z.object({ type: z.literal("MultiPolygon"), coordinates }),
      ]),
    }),
  ),
});

/** A boundary as [polygon][ring][vertex], rings closed as they came. */
export function boundaryOf(id: string): [number, number][][][] {
  return boundary
    .parse(file(`${id}.geojson`))
    .features.flatMap(({ geometry }) => (geometry.type === "Polygon" ? [geometry.coordinates] : geometry.coordinates));
}
