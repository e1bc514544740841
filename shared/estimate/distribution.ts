import { moments } from "./moments.ts";
import type { Distribution, DistributionBin } from "./result.ts";

/** Whole counts up to here get a bin for each number. */
const MOST_SINGLE_BINS = 40;
const MOST_CLASSES = 16;

/**
 * The empirical quantile: the smallest value that at least a share p of the values do not exceed. It is always one of the
 * values (definition 1 of Hyndman & Fan 1996).
 * @throws RangeError for no value, or p outside 0 … 1.
 */
export function quantileOf(sorted: readonly number[], p: number): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`a share is from 0 to 1, got ${p}`);
  const rank = Math.max(1, Math.ceil(p * sorted.length));
  const value = sorted[rank - 1];
  if (value === undefined) throw new RangeError("a quantile needs at least one value, got none");
  return value;
}

/** The smallest of 1, 2, 5, 10, 20, 50 … (or 0.5, 0.2 …) with which the classes up to `maximum` are few enough. */
function classWidth(maximum: number, smallest: number): number {
  const least = maximum / MOST_CLASSES;
  const power = Math.floor(Math.log10(Math.max(least, smallest)));
  for (const exponent of [power - 1, power, power + 1]) {
    for (const digit of [1, 2, 5]) {
      const width = Number(`${digit}e${exponent}`);
      if (width >= least && width >= smallest) return width;
    }
  }
  throw new RangeError(`no class width for counts up to ${maximum}`);
}

function singleBins(sorted: readonly number[], maximum: number): DistributionBin[] {
  return Array.from({ length: maximum + 1 }, (_, value) => ({
    from: value,
    to: value,
    picks: sorted.filter((count) => count === value).length,
  }));
}

/** A bin of the zeros, then classes of equal width from there on: 1–5, 6–10 … or above 0 to 0.5, above 0.5 to 1 … */
function classBins(sorted: readonly number[], maximum: number, whole: boolean): DistributionBin[] {
  const width = classWidth(maximum, whole ? 1 : Number.MIN_VALUE);
  const zeros: DistributionBin = { from: 0, to: 0, picks: sorted.filter((count) => count === 0).length };
  // Width times a whole number, as the nearest decimal: 3 · 0.1 is 0.3.
  const edge = (i: number) => Number((i * width).toPrecision(12));
  const bins: DistributionBin[] = [zeros];
  for (let i = 0; edge(i) < maximum; i += 1) {
    const [from, to] = [edge(i), edge(i + 1)];
    const picks = sorted.filter((count) => count > from && count <= to).length;
    bins.push({ from: whole ? from + 1 : from, to, picks });
  }
  return bins;
}

/**
 * How the counts of the n picks are spread: bins for a plot and its table, the share of zeros, mean and quantiles. Zeros
 * have a bin of their own. Whole counts up to 40 get a bin a number, wider ones classes of 1, 2 or 5 times a power of ten.
 * @throws RangeError for no value.
 */
export function distributionOf(values: readonly number[]): Distribution {
  const sorted = values.toSorted((a, b) => a - b);
  const { mean } = moments(sorted);
  const maximum = quantileOf(sorted, 1);
  const whole = sorted.every((value) => Number.isSafeInteger(value));
  const zeros = sorted.filter((value) => value === 0).length;
  return {
    kind: whole ? "whole" : "measured",
    bins: whole && maximum <= MOST_SINGLE_BINS ? singleBins(sorted, maximum) : classBins(sorted, maximum, whole),
    zeros,
    shareOfZeros: zeros / sorted.length,
    mean,
    quantiles: {
      minimum: quantileOf(sorted, 0),
      lowerQuartile: quantileOf(sorted, 0.25),
      median: quantileOf(sorted, 0.5),
      upperQuartile: quantileOf(sorted, 0.75),
      percentile95: quantileOf(sorted, 0.95),
      maximum,
    },
  };
}
