import quantile from "@stdlib/stats-base-dists-t-quantile";
import { checkLevel } from "./level.ts";

/**
 * Two-sided quantile of Student's t: the t with a chance of `level` between −t and t, for any degrees of freedom above 0,
 * fractions too (Satterthwaite). Taken from the lower tail, (1 − level)/2, which loses nothing to rounding near 1.
 * @throws RangeError for degrees of freedom that are not above 0; Problem `input-invalid` for a level outside 0 … 1.
 */
export function tQuantile(level: number, degreesOfFreedom: number): number {
  checkLevel(level);
  if (!(degreesOfFreedom > 0 && Number.isFinite(degreesOfFreedom))) {
    throw new RangeError(`degrees of freedom are above 0, got ${degreesOfFreedom}`);
  }
  return -quantile((1 - level) / 2, degreesOfFreedom);
}
