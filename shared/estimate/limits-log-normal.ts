import type { Figure, Limits } from "./result.ts";

/**
 * The factor of log-normal limits: C = exp(t·√ln(1 + cv²)), with cv the standard error as a share of the estimate and t the
 * two-sided Student quantile. With t = 1.96 and cv = 0.25, C = 1.6203.
 * @returns none, too wide, where C is beyond every number
 */
export function logNormalFactor(coefficientOfVariation: number, t: number): Figure {
  if (!(coefficientOfVariation >= 0)) throw new RangeError(`a CV is not negative, got ${coefficientOfVariation}`);
  const factor = Math.exp(t * Math.sqrt(Math.log1p(coefficientOfVariation * coefficientOfVariation)));
  return Number.isFinite(factor) ? { kind: "known", value: factor } : { kind: "none", why: "too-wide" };
}

/** Log-normal limits: estimate / C and estimate · C. Never below zero, and longer above than below. */
export function logNormalLimits(estimate: number, factor: Figure): Limits {
  if (factor.kind === "none") return factor;
  const upper = estimate * factor.value;
  if (!Number.isFinite(upper)) return { kind: "none", why: "too-wide" };
  return { kind: "interval", lower: estimate / factor.value, upper };
}
