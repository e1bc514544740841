import { carefulSum } from "./moments.ts";
import { quantileOf } from "./distribution.ts";
import type { MissingBounds } from "./result.ts";

/**
 * What the picks without a value leave open: the total N·Σy/(n + m) if each of the m missing picks held none, and if each
 * held the 95th percentile of the n values. Closed picks count among the missing, beside the reserves that stand in for them:
 * the opened part of the draw's list is a sample, with holes.
 */
export function missingBounds(units: number, values: readonly number[], missing: number): MissingBounds {
  if (!Number.isSafeInteger(missing) || missing < 1) throw new RangeError(`bounds need a missing pick, got ${missing}`);
  const sorted = values.toSorted((a, b) => a - b);
  const percentile = quantileOf(sorted, 0.95);
  const sum = carefulSum(sorted);
  const picks = values.length + missing;
  return {
    kind: "bounds",
    picks: missing,
    atZero: (units * sum) / picks,
    percentile,
    atPercentile: (units * (sum + missing * percentile)) / picks,
  };
}
