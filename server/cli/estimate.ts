import { valuedPicks } from "#shared/estimate/from-counts.ts";
import { estimateFromValues, type ValuesEstimate } from "#shared/estimate/from-values.ts";
import { readLevel } from "#shared/estimate/level.ts";
import type { AllZeroLimits, EstimatedDesign, Figure, Limits } from "#shared/estimate/result.ts";
import { Problem } from "#shared/problem.ts";
import { readBytes } from "./files.ts";
import { type PicksTable, readPicks } from "./picks-table.ts";
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
  const { values: given } = options(args, KNOWN, 0);
  const design = oneOf(needed(given.design, "--design"), "--design", DESIGNS, LATER_DESIGNS);
  oneOf(given.estimator ?? "expansion", "--estimator", ["expansion"], ["ratio"]);
  const units = wholeNumber(needed(given.units, "--units"), "--units");
  const level = readLevel(given.level ?? "0.95");
  const areaM2 = given.area === undefined ? "none" : decimalSteps(given.area, "--area", 9) / 1e9;
  if (areaM2 !== "none" && !(areaM2 > 0)) throw new UsageError("--area is an area in square metres above 0.");
  const table = readPicks(readBytes(needed(given.counts, "--counts")));
  for (const note of table.notes) sayError(note);
  const picks = valuedPicks(table.picks, table.counts);
  const values = picks.map(({ value }) => value);
  const distinct = distinctCells(table, picks, design, units);
  const result = estimateFromValues({ design, units, values, distinct, areaM2, level });
  if (!table.unitsKnown && design === "srs-wr" && result.total.estimate === 0) {
    sayError(result.allZero.kind === "all-zero" ? REPEATS_UNKNOWN : REST_UNKNOWN);
  }
  printJson(shape(result, table.unitsKnown ? distinct : null));
  return 0;
}

const REPEATS_UNKNOWN =
  'The table names no cells, so each pick is taken to be a cell of its own. If some are repeats, the upper limits are higher: add a column "unit".';
const REST_UNKNOWN =
  'The table names no cells, so nobody can say whether every cell was seen, and there are no upper limits: add a column "unit".';

/**
 * How many cells the picks are of. A table without a column of units names none: without replacement each pick is a cell of its
 * own, with it there may be repeats, and there must be where picks outnumber the cells of the frame.
 */
function distinctCells(
  { picks, unitsKnown }: PicksTable,
  valued: readonly { readonly unit: number }[],
  design: EstimatedDesign,
  units: number,
): number {
  if (!unitsKnown) return design === "srs-wr" ? Math.min(valued.length, units) : valued.length;
  const named = new Set(picks.map(({ unit }) => unit)).size;
  if (named <= units) return new Set(valued.map(({ unit }) => unit)).size;
  throw new Problem(
    "estimate-impossible",
    `The table names ${named} cells, and --units says that the frame has ${units}. Correct one of them.`,
  );
}

/** What is printed. Limits are those of the total; a limit or figure that can't be given is null. */
function shape({ sample, precision, total, mean, density, allZero }: ValuesEstimate, distinct: number | null): unknown {
  return {
    n: sample.picks,
    distinct,
    mean: mean.estimate,
    variance: figure(sample.variance),
    standardErrorOfMean: figure(mean.standardError),
    cv: figure(precision.coefficientOfVariation),
    degreesOfFreedom: sample.degreesOfFreedom,
    total: total.estimate,
    standardErrorOfTotal: figure(total.standardError),
    density: density.kind === "known" ? density.estimate : null,
    limits: {
      t: interval(total.limits.t),
      lognormal: interval(total.limits.logNormal),
      ...(allZero.kind === "all-zero" && zeroLimits(allZero)),
    },
  };
}

/** Upper limits by the name of their model, 1 − level above the one-sided, half of it above the two-sided. */
function zeroLimits({ oneSided, twoSided }: AllZeroLimits): Record<string, { lower: number; upper: number }> {
  return { poissonOneSided: { lower: 0, upper: oneSided }, poissonTwoSided: { lower: 0, upper: twoSided } };
}

function figure(value: Figure): number | null {
  return value.kind === "known" ? value.value : null;
}

function interval(limits: Limits): { lower: number; upper: number } | null {
  return limits.kind === "interval" ? { lower: limits.lower, upper: limits.upper } : null;
}
