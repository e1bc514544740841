import * as z from "zod/mini";
import { id, none, sha256Hex, surveyParams, utc } from "#shared/api/common.ts";
import { contract, json, stream } from "#shared/api/contract.ts";
import { declaration } from "#shared/api/draw.ts";
import { frameSummary } from "#shared/api/frame.ts";
import { season, target } from "#shared/api/surveys.ts";
import { COUNT_STATES } from "#shared/counts/count.ts";
import {
  ESTIMATE_FORMAT,
  ESTIMATED_DESIGNS,
  type EstimateResult,
  LIMIT_KINDS,
  NONE_REASONS,
} from "#shared/estimate/result.ts";

const list = <S extends z.core.$ZodType>(item: S) => z.readonly(z.array(item));
const notKnown = z.object({ kind: z.literal("none"), why: z.enum(NONE_REASONS) });
/** A number, or the reason why there is none: never NaN, never null. */
const figure = z.union([z.object({ kind: z.literal("known"), value: z.number() }), notKnown]);
const limits = z.union([z.object({ kind: z.literal("interval"), lower: z.number(), upper: z.number() }), notKnown]);
const quantity = z.object({
  estimate: z.number(),
  standardError: figure,
  limits: z.object({ t: limits, logNormal: limits }),
});
const countState = z.enum(COUNT_STATES);

const missingPick = z.object({
  order: z.int(),
  unit: z.int(),
  label: z.string(),
  state: countState,
  closed: z.boolean(),
});
const missingBounds = z.union([
  z.object({
    kind: z.literal("bounds"),
    picks: z.int(),
    atZero: z.number(),
    percentile: z.number(),
    atPercentile: z.number(),
  }),
  z.object({ kind: z.literal("none-missing") }),
]);
const allZero = z.union([
  z.object({
    kind: z.literal("all-zero"),
    model: z.literal("poisson"),
    cells: z.int(),
    oneSided: z.number(),
    twoSided: z.number(),
  }),
  z.object({ kind: z.literal("not-needed") }),
]);
const withAmendedAsCounted = z.union([
  z.object({
    kind: z.literal("amended"),
    picks: z.int(),
    total: z.number(),
    mean: z.number(),
    standardErrorOfTotal: figure,
  }),
  z.object({ kind: z.literal("none-amended") }),
]);
const farAbove = z.union([
  z.object({
    kind: z.literal("far-above"),
    unit: z.int(),
    label: z.string(),
    value: z.number(),
    nextLargest: z.number(),
    totalWithout: z.number(),
  }),
  z.object({ kind: z.literal("none-far-above") }),
]);
const distribution = z.object({
  kind: z.enum(["whole", "measured"]),
  bins: list(z.object({ from: z.number(), to: z.number(), picks: z.int() })),
  zeros: z.int(),
  shareOfZeros: z.number(),
  mean: z.number(),
  quantiles: z.object({
    minimum: z.number(),
    lowerQuartile: z.number(),
    median: z.number(),
    upperQuartile: z.number(),
    percentile95: z.number(),
    maximum: z.number(),
  }),
});

/** The whole estimate as shared/estimate/from-counts.ts makes it: numbers and codes; sentences are made from it. */
export const estimateResult = z.object({
  format: z.literal(ESTIMATE_FORMAT),
  design: z.enum(ESTIMATED_DESIGNS),
  estimator: z.literal("expansion"),
  units: z.int(),
  picksInUse: z.int(),
  picksCounted: z.int(),
  distinctCells: z.int(),
  cellsInUse: z.int(),
  countIn: z.enum(["inside", "whole"]),
  level: z.number(),
  declaredLimits: z.enum(LIMIT_KINDS),
  complete: z.boolean(),
  sampleVariance: figure,
  degreesOfFreedom: z.number(),
  tQuantile: figure,
  coefficientOfVariation: figure,
  logNormalFactor: figure,
  total: quantity,
  mean: quantity,
  density: z.union([z.extend(quantity, { kind: z.literal("known"), areaM2: z.number() }), notKnown]),
  allZero,
  seen: z.number(),
  states: list(z.object({ state: countState, picks: z.int(), cells: z.int() })),
  missing: list(missingPick),
  missingBounds,
  countedOutOfOrder: z.int(),
  withAmendedAsCounted,
  farAbove,
  distribution,
}) satisfies z.core.$ZodType<EstimateResult, EstimateResult>;

/** What an estimate stands on, for the words around it. */
export const estimateContext = z.object({
  season,
  target,
  frame: z.object({
    id,
    number: z.int(),
    sha256: sha256Hex,
    sealedAt: utc,
    crsName: z.string(),
    cellWidthM: z.number(),
    cellHeightM: z.number(),
    summary: frameSummary,
  }),
  draw: z.object({ id, number: z.int(), drawnAt: utc }),
  declaration,
  /** What was declared only after the first count was there: to be labelled "chosen after counts were seen". */
  chosenAfterCounts: z.array(z.enum(["limits", "level"])),
  firstCountAt: z.nullable(utc),
  /** Newest event: its hash stands on each printed estimate. */
  newest: z.object({ sequence: z.int(), sha256: sha256Hex }),
});
export type EstimateContext = z.infer<typeof estimateContext>;

export const readEstimate = contract({
  name: "readEstimate",
  method: "GET",
  path: "/api/surveys/:surveyId/estimate",
  guard: "estimate.read",
  summary: "The estimate from the counts in force: figures, what they stand on, and a methods statement",
  params: surveyParams,
  query: none,
  body: none,
  answer: json(
    z.object({
      result: estimateResult,
      /** SHA-256 of the result's RFC 8785 form: what somebody says they saw when they keep it. */
      resultSha256: sha256Hex,
      context: estimateContext,
      /** Markdown. */
      methods: z.string(),
    }),
  ),
});

export const exportEstimate = contract({
  name: "exportEstimate",
  method: "GET",
  path: "/api/surveys/:surveyId/estimate.csv",
  guard: "estimate.read",
  summary: "The picks with their counts (which repeat the estimate), or the figures, as CSV",
  params: surveyParams,
  query: z.object({ table: z.optional(z.enum(["picks", "figures"])) }),
  body: none,
  answer: stream("text/csv"),
});

export const keptEstimate = z.object({
  id,
  seasonId: id,
  targetId: id,
  keptAt: utc,
  keptBy: z.string(),
  resultSha256: sha256Hex,
  result: estimateResult,
});
export type KeptEstimate = z.infer<typeof keptEstimate>;

export const keepEstimate = contract({
  name: "keepEstimate",
  method: "POST",
  path: "/api/surveys/:surveyId/estimates",
  guard: "estimate.keep",
  summary: "Put the estimate as it stands on record",
  params: surveyParams,
  query: none,
  body: z.object({ resultSha256: sha256Hex }),
  answer: json(keptEstimate),
});

export const listKeptEstimates = contract({
  name: "listKeptEstimates",
  method: "GET",
  path: "/api/surveys/:surveyId/estimates",
  guard: "estimate.read",
  summary: "The estimates that were put on record, newest first",
  params: surveyParams,
  query: none,
  body: none,
  answer: json(z.object({ estimates: z.array(keptEstimate) })),
});
