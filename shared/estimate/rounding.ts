import { figuresText, magnitudeOf, numberText } from "#shared/units/number-text.ts";
import type { EstimateResult, Interval, Quantity } from "./result.ts";

/**
 * The power of ten of a standard error's second figure, at which an estimate is rounded: 599 → 1 (tens), 0.808 → −2.
 * @throws RangeError for a standard error that is not above zero.
 */
export function roundingPlace(standardError: number): number {
  if (!(standardError > 0 && Number.isFinite(standardError))) {
    throw new RangeError(`a standard error above zero gives a place, got ${standardError}`);
  }
  return magnitudeOf(standardError) - 1;
}

/** A number rounded at a power of ten, half away from zero: 2 926 at 1 is 2 930. */
export function roundAt(value: number, place: number): number {
  const size = Math.abs(value);
  // Through decimal text, so that 0.1 + 0.2 at −1 is 0.3 and no binary hair is left.
  const rounded =
    place > 0 ? Math.round(size / 10 ** place) * 10 ** place : Number(size.toFixed(Math.min(100, -place)));
  return value < 0 && rounded !== 0 ? -rounded : rounded;
}

/** How many significant figures an estimate keeps: 2 926 with a standard error of 599 keeps 3. At least one. */
export function figuresFor(estimate: number, standardError: number): number {
  const rounded = roundAt(estimate, roundingPlace(standardError));
  if (rounded === 0) return 1;
  return Math.max(1, magnitudeOf(rounded) - roundingPlace(standardError) + 1);
}

/** An estimate as precisely as two figures of its standard error warrant; without one, up to two decimals. */
export function estimateText(value: number, standardError: Quantity["standardError"]): string {
  if (standardError.kind === "none" || standardError.value === 0) {
    const decimals = Number.isInteger(Number(value.toFixed(2))) ? 0 : 2;
    return numberText(value, decimals);
  }
  const place = roundingPlace(standardError.value);
  return numberText(roundAt(value, place), Math.min(100, Math.max(0, -place)));
}

export interface PrintedLimits {
  readonly lower: string;
  readonly upper: string;
  /** A limit lay under the number seen and is printed as that number. */
  readonly raised: boolean;
}

/**
 * Limits as they are printed: rounded as the estimate is, and never under the number seen, which is certain. Files keep
 * them as computed.
 * @param seen the number seen in the quantity's unit: for the total the sum over distinct cells, for the mean that over N
 */
export function printedLimits(limits: Interval, standardError: Quantity["standardError"], seen: number): PrintedLimits {
  const text = (value: number) => estimateText(value, standardError);
  const rounded = (value: number) =>
    standardError.kind === "known" && standardError.value > 0
      ? roundAt(value, roundingPlace(standardError.value))
      : value;
  const seenText = figuresText(seen, 12);
  return {
    lower: rounded(limits.lower) < seen ? seenText : text(limits.lower),
    upper: rounded(limits.upper) < seen ? seenText : text(limits.upper),
    raised: limits.lower < seen || limits.upper < seen,
  };
}

/** The limits of one quantity of a result as they are printed; `none` where there are none. */
export function printedLimitsOf(
  result: EstimateResult,
  which: "total" | "mean" | "density",
  kind: "t" | "log-normal",
): PrintedLimits | "none" {
  const quantity = result[which];
  if ("kind" in quantity && quantity.kind === "none") return "none";
  const limits = kind === "t" ? quantity.limits.t : quantity.limits.logNormal;
  if (limits.kind === "none") return "none";
  const scale = result.total.estimate === 0 ? 0 : quantity.estimate / result.total.estimate;
  return printedLimits(limits, quantity.standardError, result.seen * scale);
}
