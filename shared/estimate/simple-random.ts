import { Problem } from "#shared/problem.ts";
import { moments } from "./moments.ts";
import type { EstimatedDesign, Figure } from "./result.ts";

export interface SimpleRandomSample {
  readonly design: EstimatedDesign;
  /** N, the units in the frame. */
  readonly units: number;
  /** One value a pick; with replacement a cell that was picked twice gives its value twice. */
  readonly values: readonly number[];
  /** Cells among the picks. */
  readonly distinct: number;
}

export interface SimpleRandomEstimate {
  readonly picks: number;
  readonly mean: number;
  readonly variance: Figure;
  readonly standardErrorOfMean: Figure;
  readonly degreesOfFreedom: number;
  /** Without replacement and n = N: all is counted, nothing is estimated. */
  readonly complete: boolean;
}

function check({ design, units, values, distinct }: SimpleRandomSample): void {
  if (!Number.isSafeInteger(units) || units < 1) {
    throw new Problem("input-invalid", `A frame of ${units} cells cannot be. Give a whole number of at least 1.`);
  }
  const n = values.length;
  if (n === 0) throw new Problem("estimate-impossible", "No pick has a count yet. Enter the first count.");
  if (!Number.isSafeInteger(distinct) || distinct < 1 || distinct > n) {
    throw new RangeError(`${n} picks can't be of ${distinct} cells`);
  }
  if (design === "srs-wor" && distinct < n) {
    throw new Problem(
      "estimate-impossible",
      `Without replacement no cell is picked twice, and here ${n} picks are of ${distinct} cells. ` +
        "Use the estimator with replacement, or take out the rows that were entered twice.",
    );
  }
  if (distinct > units) {
    throw new Problem(
      "estimate-impossible",
      `The picks are of ${distinct} cells, and the frame has ${units}. Correct the number of cells in the frame.`,
    );
  }
}

/**
 * Mean per cell of a simple random sample, with its standard error (Cochran 1977, chapter 2).
 *
 *   ȳ = Σy/n over all n picks, repeats as often as they were picked
 *   with replacement:     v(ȳ) = s²/n, no finite population correction, however large n/N
 *   without replacement:  v(ȳ) = (1 − n/N)·s²/n
 *
 * Degrees of freedom are n − 1 in both. One pick gives a mean and no standard error, unless it is the whole frame.
 * @throws Problem `estimate-impossible` for no value, for repeats without replacement and for more cells than the frame has.
 */
export function srsEstimate(sample: SimpleRandomSample): SimpleRandomEstimate {
  check(sample);
  const { design, units, values } = sample;
  const picks = values.length;
  const { mean, variance } = moments(values);
  const complete = design === "srs-wor" && picks === units;
  const known: Figure =
    variance === "undefined" ? { kind: "none", why: "one-pick" } : { kind: "known", value: variance };
  return {
    picks,
    mean,
    variance: known,
    standardErrorOfMean: standardErrorOfMean(design, known, picks, units, complete),
    degreesOfFreedom: picks - 1,
    complete,
  };
}

function standardErrorOfMean(
  design: EstimatedDesign,
  variance: Figure,
  picks: number,
  units: number,
  complete: boolean,
): Figure {
  if (complete) return { kind: "known", value: 0 };
  if (variance.kind === "none") return variance;
  switch (design) {
    case "srs-wr":
      return { kind: "known", value: Math.sqrt(variance.value / picks) };
    case "srs-wor":
      return { kind: "known", value: Math.sqrt(((units - picks) / units) * (variance.value / picks)) };
  }
}
