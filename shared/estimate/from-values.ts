import { allZeroLimits } from "./limits-all-zero.ts";
import { type Precision, precisionOf, quantities } from "./quantities.ts";
import type { EstimateResult } from "./result.ts";
import { type SimpleRandomEstimate, type SimpleRandomSample, srsEstimate } from "./simple-random.ts";

export interface ValuesInput extends SimpleRandomSample {
  /** The area that the counts speak for in m² (density.ts), or "none" for a list without areas. */
  readonly areaM2: number | "none";
  /** Confidence level as a share, 0.95. */
  readonly level: number;
}

export interface ValuesEstimate extends Pick<EstimateResult, "total" | "mean" | "density" | "allZero"> {
  readonly sample: SimpleRandomEstimate;
  readonly precision: Precision;
}

/**
 * What the numbers of a simple random sample come to, whatever the cells are called: total, mean and density with their
 * precision, and where all numbers are zero the upper limits under a model.
 * @throws Problem as srsEstimate does; `input-invalid` for a level or area that cannot be
 */
export function estimateFromValues(input: ValuesInput): ValuesEstimate {
  const { units, areaM2, level } = input;
  const sample = srsEstimate(input);
  const precision = precisionOf(sample, level);
  return { sample, precision, ...quantities(sample, precision, units, areaM2), allZero: allZero(input) };
}

/** Upper limits under a model: where all is zero and not every cell was seen. */
function allZero({ values, units, distinct, level }: ValuesInput): EstimateResult["allZero"] {
  if (values.some((value) => value > 0) || distinct >= units) return { kind: "not-needed" };
  return allZeroLimits(units, distinct, level);
}
