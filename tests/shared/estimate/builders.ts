import type { CellCount } from "#shared/counts/count.ts";
import { estimateFromCounts, type EstimateInput } from "#shared/estimate/from-counts.ts";
import type { EstimateResult, Figure, Limits } from "#shared/estimate/result.ts";

/** An input in which pick k is of unit `units[k]`, with counts by unit. */
export function inputOf(
  units: readonly number[],
  counts: Readonly<Record<number, number | CellCount>>,
  rest: Partial<EstimateInput> = {},
): EstimateInput {
  return {
    design: "srs-wr",
    units: 50,
    picks: units.map((unit, i) => ({ order: i + 1, unit, label: `A${unit}` })),
    closedPicks: [],
    counts: new Map(
      Object.entries(counts).map(([unit, count]) => [
        Number(unit),
        typeof count === "number" ? { state: "counted", value: count } : count,
      ]),
    ),
    countedBefore: new Map(),
    countIn: "inside",
    areaM2: "none",
    level: 0.95,
    limits: "log-normal",
    ...rest,
  };
}

/** Each value on a unit of its own. */
export function valuesOf(values: readonly number[], rest: Partial<EstimateInput> = {}): EstimateResult {
  const units = values.map((_, i) => i + 1);
  return estimateFromCounts(inputOf(units, Object.fromEntries(values.map((value, i) => [i + 1, value])), rest));
}

export function numberOf(figure: Figure): number {
  if (figure.kind === "none") throw new Error(`no figure: ${figure.why}`);
  return figure.value;
}

export function bounds(limits: Limits): { lower: number; upper: number } {
  if (limits.kind === "none") throw new Error(`no limits: ${limits.why}`);
  return { lower: limits.lower, upper: limits.upper };
}
