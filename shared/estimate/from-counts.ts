import { NOT_VISITED, checkValue, valueOf, type CellCount } from "#shared/counts/count.ts";
import { Problem } from "#shared/problem.ts";
import { distributionOf } from "./distribution.ts";
import { farAbove } from "./far-above.ts";
import { estimateFromValues } from "./from-values.ts";
import { missingBounds } from "./missing-bounds.ts";
import { carefulSum } from "./moments.ts";
import { ESTIMATE_FORMAT, type EstimateResult, type EstimatedDesign, type LimitKind } from "./result.ts";
import { srsEstimate } from "./simple-random.ts";
import { countedOutOfOrder, missingPicks, stateNumbers } from "./states.ts";

/** One entry of the draw. */
export interface DrawnPick {
  readonly order: number;
  readonly unit: number;
  readonly label: string;
}

export interface EstimateInput {
  readonly design: EstimatedDesign;
  /** N, the units in the frame. */
  readonly units: number;
  /** The picks in use, in draw order; a cell that was picked twice stands here twice. */
  readonly picks: readonly DrawnPick[];
  /** Closed picks, and reserves that were passed over because they fell on a closed cell. */
  readonly closedPicks: readonly DrawnPick[];
  /** What is known of each unit; a unit that is not in here was not visited yet. */
  readonly counts: ReadonlyMap<number, CellCount>;
  /** Units that were amended from a count to a closed state, with the count that was in force before. */
  readonly countedBefore: ReadonlyMap<number, number>;
  readonly countIn: "inside" | "whole";
  /** The area that the counts speak for in m² (density.ts), or "none" for a list without areas. */
  readonly areaM2: number | "none";
  /** Confidence level as a share, 0.95. */
  readonly level: number;
  /** The limits to be printed large, as declared with the draw. */
  readonly limits: LimitKind;
}

/** A pick with the number that it brings into the estimate. */
export interface ValuedPick extends DrawnPick {
  readonly value: number;
}

const distinctUnits = (picks: readonly DrawnPick[]): number => new Set(picks.map((pick) => pick.unit)).size;

function checkInput({ units, picks, closedPicks }: EstimateInput): void {
  const orders = new Set<number>();
  for (const { order, unit } of [...picks, ...closedPicks]) {
    if (!Number.isSafeInteger(unit) || unit < 1 || unit > units) {
      throw new Problem("estimate-impossible", `Pick ${order} is of unit ${unit}; the frame has units 1 to ${units}.`);
    }
    if (orders.has(order)) throw new RangeError(`pick ${order} stands twice among the picks`);
    orders.add(order);
  }
}

/**
 * The picks that bring a number, each with its own.
 * @throws Problem `estimate-impossible` where none does
 */
export function valuedPicks(picks: readonly DrawnPick[], counts: ReadonlyMap<number, CellCount>): ValuedPick[] {
  const valued = picks.flatMap((pick) => {
    const read = valueOf(counts.get(pick.unit) ?? NOT_VISITED);
    return read.known ? [{ ...pick, value: checkValue(read.value) }] : [];
  });
  if (valued.length > 0) return valued;
  throw new Problem("estimate-impossible", `None of the ${picks.length} picks has a count. Enter counts first.`);
}

/** The sum over distinct cells: what was seen, each cell once. */
function numberSeen(valued: readonly ValuedPick[]): number {
  const byUnit = new Map(valued.map((pick) => [pick.unit, pick.value]));
  return carefulSum([...byUnit.values()].sort((a, b) => a - b));
}

/** The estimate again with the counts that were amended away, so that both can be shown. */
function withAmendedAsCounted(
  input: EstimateInput,
  valued: readonly ValuedPick[],
): EstimateResult["withAmendedAsCounted"] {
  const back = [...input.picks, ...input.closedPicks].flatMap((pick): ValuedPick[] => {
    const value = input.countedBefore.get(pick.unit);
    const known = valueOf(input.counts.get(pick.unit) ?? NOT_VISITED).known;
    return value === undefined || known ? [] : [{ ...pick, value: checkValue(value) }];
  });
  if (back.length === 0) return { kind: "none-amended" };
  const all = [...valued, ...back];
  const estimate = srsEstimate({
    design: input.design,
    units: input.units,
    values: all.map((pick) => pick.value),
    distinct: distinctUnits(all),
  });
  const error = estimate.standardErrorOfMean;
  return {
    kind: "amended",
    picks: back.length,
    mean: estimate.mean,
    total: input.units * estimate.mean,
    standardErrorOfTotal: error.kind === "known" ? { kind: "known", value: input.units * error.value } : error,
  };
}

/**
 * The whole estimate of a simple random draw from its picks and their counts: total, mean and density with their
 * precision, the picks that have no number and what they leave open, and the distribution of the counts. A pure function
 * of its input, whatever the order of picks: a record is replayed by calling it again.
 *
 * Each pick enters with its cell's number, a repeat as often as it was picked. A cell that is not in the population enters
 * as 0. Picks without a value are left out and named; the estimate takes them to be like the rest.
 * @throws Problem `estimate-impossible` while there is no count at all, for repeats without replacement and units that the
 * frame doesn't have; `input-invalid` for a level, N or area that cannot be.
 */
export function estimateFromCounts(input: EstimateInput): EstimateResult {
  checkInput(input);
  const valued = valuedPicks(input.picks, input.counts);
  const { design, units, areaM2, level } = input;
  const values = valued.map((pick) => pick.value);
  const distinctCells = distinctUnits(valued);
  const { sample, precision, ...quantities } = estimateFromValues({
    design,
    units,
    values,
    distinct: distinctCells,
    areaM2,
    level,
  });
  const missing = missingPicks(input);
  return {
    format: ESTIMATE_FORMAT,
    design,
    estimator: "expansion",
    units,
    picksInUse: input.picks.length,
    picksCounted: valued.length,
    distinctCells,
    cellsInUse: distinctUnits(input.picks),
    countIn: input.countIn,
    level,
    declaredLimits: input.limits,
    complete: sample.complete,
    sampleVariance: sample.variance,
    degreesOfFreedom: sample.degreesOfFreedom,
    tQuantile: precision.t,
    coefficientOfVariation: precision.coefficientOfVariation,
    logNormalFactor: precision.logNormalFactor,
    ...quantities,
    seen: numberSeen(valued),
    states: stateNumbers(input),
    missing,
    missingBounds: missing.length === 0 ? { kind: "none-missing" } : missingBounds(units, values, missing.length),
    countedOutOfOrder: countedOutOfOrder(input),
    withAmendedAsCounted: withAmendedAsCounted(input, valued),
    farAbove: farAbove(units, valued),
    distribution: distributionOf(values),
  };
}
