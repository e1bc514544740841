import * as z from "zod/mini";
import { id, longText, none, reason, sha256Hex, surveyParams, utc } from "#shared/api/common.ts";
import { contract, json } from "#shared/api/contract.ts";

export const design = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("srs-wr"), n: z.int().check(z.minimum(1), z.maximum(100_000)) }),
  z.object({ kind: z.literal("srs-wor"), n: z.int().check(z.minimum(1), z.maximum(100_000)) }),
]);
export const generatorName = z.enum(["sha256-counter", "arc4"]);
export const limitsName = z.enum(["log-normal", "t"]);
export const seedSource = z.enum(["made-here", "typed"]);

export const declaration = z.object({
  id,
  frameId: id,
  frameNumber: z.int(),
  frameSha256: sha256Hex,
  units: z.int(),
  design,
  generator: generatorName,
  reserves: z.int(),
  limits: limitsName,
  level: z.string(),
  seedSource,
  note: z.string(),
  sha256: sha256Hex,
  declaredAt: utc,
  declaredBy: z.string(),
  state: z.enum(["open", "drawn", "abandoned"]),
  /** null until there is one, and for whoever sees only their own cells. */
  seed: z.nullable(z.object({ text: z.string(), at: utc, by: z.string() })),
  abandoned: z.nullable(z.object({ at: utc, by: z.string(), reason: z.string() })),
  drawId: z.nullable(id),
});
export type Declaration = z.infer<typeof declaration>;

/** How an entry of the draw stands now. */
export const entryState = z.enum(["in-use", "closed", "reserve", "passed-over"]);

export const drawEntry = z.object({
  stratum: z.string(),
  position: z.int(),
  unit: z.int(),
  column: z.int(),
  row: z.int(),
  label: z.string(),
  /** Position of the first entry that holds the same cell, or null. */
  repeatOf: z.nullable(z.int()),
  /** Drawn as a reserve (position > n). */
  reserve: z.boolean(),
  state: entryState,
  /** For an opened reserve: the position whose closing opened it. */
  openedFor: z.nullable(z.int()),
  /** The visit of this cell in the season, once it is or was in use. */
  visitId: z.nullable(id),
  /** State of the cell's count for the first target: "not-visited" until there is one. */
  count: z.enum(["not-visited", "counted", "zero", "not-in-population", "refused", "unsafe", "not-reached", "lost"]),
});
export type DrawEntry = z.infer<typeof drawEntry>;

export const drawSummary = z.object({
  id,
  number: z.int(),
  declarationId: id,
  frameId: id,
  state: z.enum(["live", "withdrawn"]),
  drawnAt: utc,
  drawnBy: z.string(),
  picks: z.int(),
  cellsToVisit: z.int(),
  reserves: z.int(),
  withdrawn: z.nullable(z.object({ at: utc, by: z.string(), reason: z.string() })),
});
export const drawDetail = z.extend(drawSummary, { declaration, entries: z.array(drawEntry) });
export type DrawDetail = z.infer<typeof drawDetail>;

const declarationParams = z.object({ surveyId: id, declarationId: id });
const drawParams = z.object({ surveyId: id, drawId: id });

export const listDraws = contract({
  name: "listDraws",
  method: "GET",
  path: "/api/surveys/:surveyId/draws",
  guard: "survey.see",
  summary: "Every declaration and draw ever made here, newest first, and which draw is live",
  params: surveyParams,
  query: none,
  body: none,
  answer: json(
    z.object({
      declarations: z.array(declaration),
      draws: z.array(drawSummary),
      liveDrawId: z.nullable(id),
      /** Why a new draw would have to give a reason, if it would. */
      reasonNeeded: z.nullable(z.enum(["waypoints-exported", "third-draw-in-a-day"])),
    }),
  ),
});

export const declareDraw = contract({
  name: "declareDraw",
  method: "POST",
  path: "/api/surveys/:surveyId/declarations",
  guard: "draw.make",
  summary: "Say, before the seed exists, what will be drawn and how",
  params: surveyParams,
  query: none,
  body: z.object({
    frameId: id,
    design,
    generator: generatorName,
    reserves: z.int().check(z.minimum(0), z.maximum(100_000)),
    limits: limitsName,
    /** Decimal text: "0.95". */
    level: z.string().check(z.regex(/^0\.\d{1,6}$/, "is a share below 1, such as 0.95")),
    seedSource,
    note: longText,
  }),
  answer: json(declaration),
});

export const makeDraw = contract({
  name: "makeDraw",
  method: "POST",
  path: "/api/surveys/:surveyId/declarations/:declarationId/draw",
  guard: "draw.make",
  summary: "Make or take the seed, and draw; once a declaration",
  params: declarationParams,
  query: none,
  body: z.object({ seed: z.optional(z.string().check(z.maxLength(2000))) }),
  answer: json(drawDetail),
});

export const abandonDeclaration = contract({
  name: "abandonDeclaration",
  method: "POST",
  path: "/api/surveys/:surveyId/declarations/:declarationId/abandon",
  guard: "draw.make",
  summary: "End a declaration without a draw; it stays on record",
  params: declarationParams,
  query: none,
  body: z.object({ reason }),
  answer: json(declaration),
});

export const readDraw = contract({
  name: "readDraw",
  method: "GET",
  path: "/api/surveys/:surveyId/draws/:drawId",
  guard: "survey.see",
  summary: "One draw with all its entries in draw order",
  params: drawParams,
  query: none,
  body: none,
  answer: json(drawDetail),
});

export const withdrawDraw = contract({
  name: "withdrawDraw",
  method: "POST",
  path: "/api/surveys/:surveyId/draws/:drawId/withdraw",
  guard: "draw.make",
  summary: "Take a draw out of use; its picks stay on record",
  params: drawParams,
  query: none,
  body: z.object({ reason }),
  answer: json(drawDetail),
});

export const readRecipe = contract({
  name: "readRecipe",
  method: "GET",
  path: "/api/surveys/:surveyId/draws/:drawId/recipe",
  guard: "record.read",
  summary: "How to repeat this draw with ordinary tools",
  params: drawParams,
  query: none,
  body: none,
  answer: json(z.object({ shell: z.string(), python: z.string() })),
});
