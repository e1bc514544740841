import { perHectare } from "./density.ts";
import { logNormalFactor, logNormalLimits } from "./limits-log-normal.ts";
import { tLimits } from "./limits-t.ts";
import type { EstimateResult, Figure, Limits, None, Quantity } from "./result.ts";
import type { SimpleRandomEstimate } from "./simple-random.ts";
import { tQuantile } from "./t-quantile.ts";

/** What all quantities of one estimate share: they differ by a constant factor only. */
export interface Precision {
  readonly t: Figure;
  readonly coefficientOfVariation: Figure;
  readonly logNormalFactor: Figure;
  /** Whether limits can be given, and why not. A complete count has limits that are the count itself. */
  readonly limits: { readonly kind: "from-sample" } | { readonly kind: "complete" } | None;
}

function limitsFor(estimate: SimpleRandomEstimate): Precision["limits"] {
  if (estimate.complete) return { kind: "complete" };
  if (estimate.variance.kind === "none") return estimate.variance;
  if (estimate.variance.value > 0) return { kind: "from-sample" };
  return { kind: "none", why: estimate.mean === 0 ? "all-zero" : "no-variation" };
}

/**
 * Student's t, coefficient of variation SE/ȳ and the log-normal factor of a sample. One pick, a sample without variation and one
 * of zeros have no limits, each told by its own reason.
 */
export function precisionOf(estimate: SimpleRandomEstimate, level: number): Precision {
  const { mean, standardErrorOfMean, degreesOfFreedom } = estimate;
  const limits = limitsFor(estimate);
  const t: Figure =
    degreesOfFreedom > 0
      ? { kind: "known", value: tQuantile(level, degreesOfFreedom) }
      : { kind: "none", why: "one-pick" };
  const coefficientOfVariation: Figure =
    standardErrorOfMean.kind === "none"
      ? standardErrorOfMean
      : mean === 0
        ? { kind: "none", why: "mean-zero" }
        : { kind: "known", value: standardErrorOfMean.value / mean };
  return { t, coefficientOfVariation, logNormalFactor: factorOf(limits, coefficientOfVariation, t), limits };
}

function factorOf(limits: Precision["limits"], coefficientOfVariation: Figure, t: Figure): Figure {
  if (limits.kind === "none") return limits;
  if (coefficientOfVariation.kind === "none") return coefficientOfVariation;
  if (limits.kind === "complete") return { kind: "known", value: 1 };
  return t.kind === "none" ? t : logNormalFactor(coefficientOfVariation.value, t.value);
}

function limitsOf(
  estimate: number,
  standardError: Figure,
  { t, logNormalFactor: factor, limits }: Precision,
): { t: Limits; logNormal: Limits } {
  if (limits.kind === "none") return { t: limits, logNormal: limits };
  if (limits.kind === "complete") {
    const itself: Limits = { kind: "interval", lower: estimate, upper: estimate };
    return { t: itself, logNormal: itself };
  }
  if (t.kind === "none") return { t, logNormal: t };
  if (standardError.kind === "none") return { t: standardError, logNormal: standardError };
  return {
    t: tLimits(estimate, standardError.value, t.value),
    logNormal: logNormalLimits(estimate, factor),
  };
}

/** The mean times a constant: estimate, standard error and limits scale alike. */
function quantity(scale: number, estimate: SimpleRandomEstimate, precision: Precision): Quantity {
  const value = scale * estimate.mean;
  const error = estimate.standardErrorOfMean;
  const standardError: Figure = error.kind === "known" ? { kind: "known", value: scale * error.value } : error;
  return { estimate: value, standardError, limits: limitsOf(value, standardError, precision) };
}

/** Total N·ȳ, mean ȳ and density N·ȳ/A per hectare, each with its precision. */
export function quantities(
  estimate: SimpleRandomEstimate,
  precision: Precision,
  units: number,
  areaM2: number | "none",
): Pick<EstimateResult, "total" | "mean" | "density"> {
  return {
    total: quantity(units, estimate, precision),
    mean: quantity(1, estimate, precision),
    density:
      areaM2 === "none"
        ? { kind: "none", why: "no-area" }
        : { kind: "known", areaM2, ...quantity(perHectare(units, areaM2), estimate, precision) },
  };
}
