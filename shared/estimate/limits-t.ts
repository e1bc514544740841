import type { Interval } from "./result.ts";

/**
 * Limits by Student's t: estimate ∓ t·SE. They can fall below zero, and with clumped counts the truth lies above them more
 * often than the level says; both are told, not mended.
 * @param t two-sided quantile for the level and the degrees of freedom
 */
export function tLimits(estimate: number, standardError: number, t: number): Interval {
  return { kind: "interval", lower: estimate - t * standardError, upper: estimate + t * standardError };
}
