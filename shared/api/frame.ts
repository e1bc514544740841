import * as z from "zod/mini";
import { id, none, sha256Hex, shortText, surveyParams, utc } from "#shared/api/common.ts";
import { contract, json, stream } from "#shared/api/contract.ts";

const wholeMm = z.int();
export const cellSpec = z.object({
  shape: z.literal("rectangle"),
  widthMm: wholeMm.check(z.positive()),
  heightMm: wholeMm.check(z.positive()),
  originEastMm: wholeMm,
  originNorthMm: wholeMm,
  rotationMicroDegrees: z.literal(0),
});

export const membership = z.discriminatedUnion("rule", [
  z.object({ rule: z.literal("touch") }),
  z.object({ rule: z.literal("centre") }),
  z.object({ rule: z.literal("inside") }),
  z.object({ rule: z.literal("share"), atLeast: z.int().check(z.positive(), z.maximum(1_000_000_000)) }),
]);
export const countIn = z.enum(["inside", "whole"]);

export const leftOutCell = z.object({ column: z.int(), row: z.int(), reason: shortText });

/** All that decides a frame, before the rings: what a planner sets and what sealing turns into a statement. */
export const frameSpec = z.object({
  areaId: id,
  epsg: z.int().check(z.positive()),
  cells: cellSpec,
  membership,
  countIn,
  leftOut: z.array(leftOutCell).check(z.maxLength(100_000)),
});
export type FrameSpec = z.infer<typeof frameSpec>;

/** How many cells, and what they cover. Areas in square metres of the plane. */
export const frameSummary = z.object({
  cells: z.int(),
  wholeCells: z.int(),
  edgeCells: z.int(),
  /** What the estimate speaks for: the listed shares under "inside", whole cells under "whole". */
  frameAreaM2: z.number(),
  areaM2: z.number(),
  /** Part of the study area that no listed cell holds. */
  uncoveredM2: z.number(),
  /** Part of the listed cells that lies outside the study area. */
  outsideM2: z.number(),
});
export type FrameSummary = z.infer<typeof frameSummary>;

export const frameVersion = z.object({
  id,
  number: z.int(),
  state: z.enum(["draft", "sealed"]),
  spec: frameSpec,
  /** SHA-256 of the draft with its rings: what a planner says they saw when they seal. */
  draftSha256: sha256Hex,
  crs: z.object({ text: z.string(), epsg: z.nullable(z.int()), name: z.string() }),
  /** Known once sealed. */
  sealed: z.nullable(
    z.object({
      at: utc,
      by: z.string(),
      units: z.int(),
      listSha256: sha256Hex,
      frameSha256: sha256Hex,
      summary: frameSummary,
    }),
  ),
  draws: z.int(),
  createdAt: utc,
});
export type FrameVersion = z.infer<typeof frameVersion>;

/** What a refusal "changed-meanwhile" of a draft holds as `current`: what is kept now; null where it was sealed. */
export const draftNow = z.nullable(z.object({ spec: frameSpec, draftSha256: sha256Hex }));

const frameParams = z.object({ surveyId: id, frameId: id });

export const listFrames = contract({
  name: "listFrames",
  method: "GET",
  path: "/api/surveys/:surveyId/frames",
  guard: "survey.see",
  summary: "The frame versions, newest first; the first may be a draft",
  params: surveyParams,
  query: none,
  body: none,
  answer: json(z.object({ frames: z.array(frameVersion) })),
});

export const saveDraftFrame = contract({
  name: "saveDraftFrame",
  method: "PUT",
  path: "/api/surveys/:surveyId/frames/draft",
  guard: "frame.change",
  summary: "Keep what the planner has set over the draft that was seen; a draft becomes a version when it is sealed",
  params: surveyParams,
  query: none,
  body: z.object({
    spec: frameSpec,
    /** draftSha256 of the draft that was there when the setting began; null where there was none. */
    seen: z.nullable(sha256Hex),
  }),
  answer: json(frameVersion),
});

export const sealFrame = contract({
  name: "sealFrame",
  method: "POST",
  path: "/api/surveys/:surveyId/frames/:frameId/seal",
  guard: "frame.change",
  summary: "Freeze the frame for ever: list, statement and hash",
  params: frameParams,
  query: none,
  body: z.object({ draftSha256: sha256Hex, cells: z.int() }),
  answer: json(frameVersion),
});

export const readFrameStatement = contract({
  name: "readFrameStatement",
  method: "GET",
  path: "/api/surveys/:surveyId/frames/:frameId/statement",
  guard: "record.read",
  summary: "The frame statement as it was hashed (RFC 8785)",
  params: frameParams,
  query: none,
  body: none,
  answer: stream("application/json"),
});

export const readFrameList = contract({
  name: "readFrameList",
  method: "GET",
  path: "/api/surveys/:surveyId/frames/:frameId/list",
  guard: "record.read",
  summary: "The list of units as it was hashed: column,row,shareInBillionths,stratum",
  params: frameParams,
  query: none,
  body: none,
  answer: stream("text/plain"),
});

/** The packed cells of a sealed frame, with a format version; unpacked by shared/frame/pack.ts. */
export const readFrameCells = contract({
  name: "readFrameCells",
  method: "GET",
  path: "/api/surveys/:surveyId/frames/:frameId/cells",
  guard: "survey.see",
  summary: "The cells of a sealed frame, packed",
  params: frameParams,
  query: none,
  body: none,
  answer: stream("application/octet-stream"),
});
