/**
 * A sum that keeps what rounding drops (Neumaier 1974): each addition's exact error goes into a second sum that is
 * added at the end. The result's relative error stays near 2⁻⁵² for numbers of one sign.
 */
export function carefulSum(values: Iterable<number>): number {
  let sum = 0;
  let dropped = 0;
  for (const value of values) {
    const next = sum + value;
    dropped += Math.abs(sum) >= Math.abs(value) ? sum - next + value : value - next + sum;
    sum = next;
  }
  return sum + dropped;
}

export interface Moments {
  readonly mean: number;
  /** Σ(y − ȳ)²/(n − 1); "undefined" for a single value. */
  readonly variance: number | "undefined";
}

/**
 * Mean ȳ = Σy/n and variance s² = Σ(y − ȳ)²/(n − 1), without cancellation: two passes, the second corrected for the rounding
 * of the mean, s² = (Σd² − (Σd)²/n)/(n − 1) with d = y − ȳ (Chan, Golub & LeVeque 1983). Values are sorted first: their order
 * changes nothing.
 * @throws RangeError for no values, or one that is not finite.
 */
export function moments(values: readonly number[]): Moments {
  const wrong = values.find((value) => !Number.isFinite(value));
  if (wrong !== undefined) throw new RangeError(`moments need finite values, got ${wrong}`);
  const n = values.length;
  if (n === 0) throw new RangeError("moments need at least one value, got none");
  const sorted = values.toSorted((a, b) => a - b);
  const mean = carefulSum(sorted) / n;
  if (n === 1) return { mean, variance: "undefined" };
  const distances = sorted.map((value) => value - mean);
  const left = carefulSum(distances);
  const squares = carefulSum(distances.map((distance) => distance * distance));
  return { mean, variance: Math.max(0, (squares - (left * left) / n) / (n - 1)) };
}
