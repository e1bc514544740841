import { estimateFromCounts } from "#shared/estimate/from-counts.ts";
import { readLevel } from "#shared/estimate/level.ts";
import type { EstimateResult, Figure, Limits } from "#shared/estimate/result.ts";
import { readBytes } from "./files.ts";
import { readPicks } from "./picks-table.ts";
import { decimalSteps, needed, oneOf, options, printJson, sayError, UsageError, wholeNumber } from "./usage.ts";

const KNOWN = {
  counts: { type: "string" },
  design: { type: "string" },
  units: { type: "string" },
  area: { type: "string" },
  level: { type: "string" },
  estimator: { type: "string" },
} as const;

export const DESIGNS = ["srs-wr", "srs-wor"] as const;
export const LATER_DESIGNS = ["stratified-wr", "stratified-wor", "systematic", "balanced", "pps-wr"];

/** `quillet estimate`: the estimate of a table of picks. `variance` is s² of the counts; `density` is per hectare. */
export function estimate(args: readonly string[]): number {
  const { values } = options(args, KNOWN, 0);
  const design = oneOf(needed(values.design, "--design"), "--design", DESIGNS, LATER_DESIGNS);
  oneOf(values.estimator ?? "expansion", "--estimator", ["expansion"], ["ratio"]);
  const units = wholeNumber(needed(values.units, "--units"), "--units");
  const level = readLevel(values.level ?? "0.95");
  const areaM2 = values.area === undefined ? "none" : decimalSteps(values.area, "--area", 9) / 1e9;
  if (areaM2 !== "none" && !(areaM2 > 0)) throw new UsageError("--area is an area in square metres above 0.");
  const { picks, counts, unitsKnown, notes } = readPicks(readBytes(needed(values.counts, "--counts")));
  for (const note of notes) sayError(note);
  const result = estimateFromCounts({
    design,
    units,
    picks,
    closedPicks: [],
    counts,
    countedBefore: new Map(),
    countIn: "whole",
    areaM2,
    level,
    limits: "log-normal",
  });
  printJson(shape(result, unitsKnown));
  return 0;
}

function shape(result: EstimateResult, unitsKnown: boolean): unknown {
  const { total, mean, density } = result;
  return {
    n: result.picksCounted,
    distinct: unitsKnown ? result.distinctCells : null,
    mean: mean.estimate,
    variance: figure(result.sampleVariance),
    standardErrorOfMean: figure(mean.standardError),
    cv: figure(result.coefficientOfVariation),
    degreesOfFreedom: result.degreesOfFreedom,
    total: total.estimate,
    standardErrorOfTotal: figure(total.standardError),
    density: density.kind === "known" ? density.estimate : null,
    limits: { t: interval(total.limits.t), lognormal: interval(total.limits.logNormal) },
  };
}

function figure(value: Figure): number | null {
  return value.kind === "known" ? value.value : null;
}

function interval(limits: Limits): { lower: number; upper: number } | null {
  return limits.kind === "interval" ? { lower: limits.lower, upper: limits.upper } : null;
}
