const EXACT_BELOW = 9_007_199_254_740_992;

/** Results of the last `multiplyDivide`: quotient and remainder. One place, so that nothing is allocated in the walk. */
export const divided = new Float64Array(2);

/**
 * a·b = quotient·c + remainder with 0 ≤ remainder < c, exactly, for whole numbers a ≥ 0, b ≥ 0, c > 0 below 2⁵³; the
 * product may be larger. The results stand in `divided`.
 */
export function multiplyDivide(a: number, b: number, c: number): void {
  const product = a * b;
  if (product < EXACT_BELOW) {
    let quotient = Math.floor(product / c);
    let remainder = product - quotient * c;
    if (remainder < 0) {
      quotient -= 1;
      remainder += c;
    }
    divided[0] = quotient;
    divided[1] = remainder;
    return;
  }
  const big = BigInt(a) * BigInt(b);
  const by = BigInt(c);
  divided[0] = Number(big / by);
  divided[1] = Number(big % by);
}
