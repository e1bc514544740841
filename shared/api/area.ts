import * as z from "zod/mini";
import { id, none, polygons, sha256Hex, surveyParams, utc } from "#shared/api/common.ts";
import { contract, json, stream } from "#shared/api/contract.ts";
import { areaAnswers } from "#shared/area/questions.ts";

/** What an import found, mended, left aside; kept with the file for ever. */
export const importReport = z.object({
  format: z.string(),
  fileName: z.string(),
  bytes: z.int(),
  sha256: sha256Hex,
  crs: z.object({ name: z.string(), epsg: z.nullable(z.int()), text: z.string(), howKnown: z.string() }),
  features: z.int(),
  parts: z.int(),
  rings: z.int(),
  holes: z.int(),
  vertices: z.int(),
  geodesicAreaM2: z.number(),
  /** west, south, east, north in WGS 84 degrees. */
  bounds: z.tuple([z.number(), z.number(), z.number(), z.number()]),
  mended: z.array(z.string()),
  ignored: z.array(z.string()),
  notes: z.array(z.string()),
  answers: z.optional(z.omit(areaAnswers, { crs: true })),
});

export const crsChoice = z.object({ epsg: z.int(), name: z.string(), note: z.string() });
export type CrsChoice = z.infer<typeof crsChoice>;

export const areaVersion = z.object({
  id,
  number: z.int(),
  importedAt: utc,
  importedBy: z.string(),
  report: importReport,
  /** For the map, in WGS 84 degrees; simplified only where there are very many vertices. */
  outline: polygons,
  outlineSimplified: z.boolean(),
  /** Projected systems proposed for the frame, best first. */
  suggestedCrs: z.array(crsChoice),
});
export type AreaVersion = z.infer<typeof areaVersion>;

const areaParams = z.object({ surveyId: id, areaId: id });

export const MAX_AREA_FILE_BYTES = 60_000_000;

export const listAreas = contract({
  name: "listAreas",
  method: "GET",
  path: "/api/surveys/:surveyId/areas",
  guard: "survey.see",
  summary: "The versions of the study area, newest first",
  params: surveyParams,
  query: none,
  body: none,
  answer: json(z.object({ areas: z.array(areaVersion) })),
});

export const importArea = contract({
  name: "importArea",
  method: "POST",
  path: "/api/surveys/:surveyId/areas",
  guard: "area.change",
  summary: "Import a study area from a boundary file; a refusal “area-question” says what it leaves open",
  params: surveyParams,
  query: none,
  body: areaAnswers,
  upload: { field: "file", maxBytes: MAX_AREA_FILE_BYTES },
  answer: json(areaVersion),
});

export const readAreaFile = contract({
  name: "readAreaFile",
  method: "GET",
  path: "/api/surveys/:surveyId/areas/:areaId/file",
  guard: "record.read",
  summary: "The boundary file as it came, byte for byte",
  params: areaParams,
  query: none,
  body: none,
  answer: stream("application/octet-stream"),
});

export const searchCrs = contract({
  name: "searchCrs",
  method: "GET",
  path: "/api/crs",
  guard: "signed-in",
  summary: "Coordinate reference systems by code or name",
  params: none,
  query: z.object({ text: z.string().check(z.maxLength(100)), projected: z.optional(z.literal("yes")) }),
  body: none,
  answer: json(z.object({ systems: z.array(crsChoice) })),
});

/** The area on a projected plane: the rings that a frame in this CRS will hold (made once, on the server, and kept). */
export const planeRings = z.object({
  areaId: id,
  crs: z.object({ text: z.string(), epsg: z.nullable(z.int()), name: z.string() }),
  /** Whole millimetres. */
  rings: polygons,
  ringsSha256: sha256Hex,
  planeAreaM2: z.number(),
  geodesicAreaM2: z.number(),
  notes: z.array(z.string()),
  /** Fits plane metres to WGS 84 at a 3 × 3 net of points over the bounds, for the graticule: [east, north, lng, lat]. */
  net: z.array(z.tuple([z.number(), z.number(), z.number(), z.number()])),
});
export type PlaneRings = z.infer<typeof planeRings>;

export const makePlane = contract({
  name: "makePlane",
  method: "POST",
  path: "/api/surveys/:surveyId/areas/:areaId/planes",
  guard: "frame.change",
  summary: "The study area on a projected plane, in whole millimetres",
  params: areaParams,
  query: none,
  body: z.object({ epsg: z.int().check(z.positive()) }),
  answer: json(planeRings),
});

export const readPlane = contract({
  name: "readPlane",
  method: "GET",
  path: "/api/surveys/:surveyId/areas/:areaId/planes/:epsg",
  guard: "survey.see",
  summary: "The study area on a plane that was made before",
  params: z.object({ surveyId: id, areaId: id, epsg: z.string().check(z.regex(/^\d{1,9}$/)) }),
  query: none,
  body: none,
  answer: json(planeRings),
});
