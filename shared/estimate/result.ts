import type { CountState } from "#shared/counts/count.ts";

export const ESTIMATE_FORMAT = "quillet-estimate/1";

/** Designs whose estimators are here, with the names of the draw. */
export const ESTIMATED_DESIGNS = ["srs-wr", "srs-wor"] as const;
export type EstimatedDesign = (typeof ESTIMATED_DESIGNS)[number];

export const LIMIT_KINDS = ["log-normal", "t"] as const;
export type LimitKind = (typeof LIMIT_KINDS)[number];

/**
 * Why a figure can't be given.
 * - one-pick: one count tells nothing of precision.
 * - no-variation: all counts are equal; the sample shows no variation, so limits would say nothing.
 * - all-zero: every count is zero; see `allZero` for the upper limit.
 * - mean-zero: a coefficient of variation or a factor needs a mean above zero.
 * - too-wide: the limits are beyond every number.
 * - no-area: the frame is a list without areas.
 */
export const NONE_REASONS = ["one-pick", "no-variation", "all-zero", "mean-zero", "too-wide", "no-area"] as const;
type NoneReason = (typeof NONE_REASONS)[number];

export interface None {
  readonly kind: "none";
  readonly why: NoneReason;
}

/** A number, or the reason why there is none. Never NaN, never null. */
export type Figure = { readonly kind: "known"; readonly value: number } | None;

/** Two limits as computed; what is printed may differ, see `printedLimits`. */
export interface Interval {
  readonly kind: "interval";
  readonly lower: number;
  readonly upper: number;
}
export type Limits = Interval | None;

/** One thing that is estimated, with its precision. All quantities of a result are the mean times a constant. */
export interface Quantity {
  readonly estimate: number;
  readonly standardError: Figure;
  readonly limits: { readonly t: Limits; readonly logNormal: Limits };
}

/** A pick that has no number, by name. */
export interface MissingPick {
  readonly order: number;
  readonly unit: number;
  readonly label: string;
  readonly state: CountState;
  /** Closed picks have been stood in for by a reserve, where there was one; the others are still waited for. */
  readonly closed: boolean;
}

/** What the missing picks leave open: the total if each of them held none, and if each held a high count. */
export interface MissingBounds {
  readonly kind: "bounds";
  readonly picks: number;
  readonly atZero: number;
  /** The 95th percentile of the counts in use. */
  readonly percentile: number;
  readonly atPercentile: number;
}

/** Upper limits of the total where every count is zero, under a Poisson model. */
export interface AllZeroLimits {
  readonly kind: "all-zero";
  readonly model: "poisson";
  /** Distinct cells in which none was found. */
  readonly cells: number;
  /** All of 1 − level above the limit. */
  readonly oneSided: number;
  /** Half of 1 − level above the limit, as in two-sided limits. */
  readonly twoSided: number;
}

export interface DistributionBin {
  readonly from: number;
  readonly to: number;
  readonly picks: number;
}

export interface Distribution {
  /**
   * whole: a bin holds from … to, both included. measured: a bin holds what is above `from` and at most `to`. In both
   * the first bin holds the zeros alone (0 … 0).
   */
  readonly kind: "whole" | "measured";
  readonly bins: readonly DistributionBin[];
  readonly zeros: number;
  readonly shareOfZeros: number;
  readonly mean: number;
  readonly quantiles: {
    readonly minimum: number;
    readonly lowerQuartile: number;
    readonly median: number;
    readonly upperQuartile: number;
    readonly percentile95: number;
    readonly maximum: number;
  };
}

/** A count at least ten times the next largest: kept, and named with what it does to the total. */
interface FarAbove {
  readonly kind: "far-above";
  readonly unit: number;
  readonly label: string;
  readonly value: number;
  readonly nextLargest: number;
  readonly totalWithout: number;
}

/**
 * A whole estimate: numbers and codes only, so that it can be kept as JSON, repeated from a record and compared number
 * by number. Sentences, notes and formulas are made from it (sentence.ts, notes.ts, formula.ts).
 */
export interface EstimateResult {
  readonly format: typeof ESTIMATE_FORMAT;
  readonly design: EstimatedDesign;
  readonly estimator: "expansion";
  /** N, the units in the frame. */
  readonly units: number;
  /** Picks in use, counted or not. */
  readonly picksInUse: number;
  /** n, the picks with a value: counted, or not in the population. */
  readonly picksCounted: number;
  /** Cells among the n picks. */
  readonly distinctCells: number;
  /** Cells among all picks in use. */
  readonly cellsInUse: number;
  readonly countIn: "inside" | "whole";
  readonly level: number;
  /** Which limits are printed large. */
  readonly declaredLimits: LimitKind;
  /** Every unit of the frame was counted without replacement: the standard error is 0. */
  readonly complete: boolean;
  /** s² over the n picks, n − 1 below. */
  readonly sampleVariance: Figure;
  readonly degreesOfFreedom: number;
  readonly tQuantile: Figure;
  /** SE(T)/T as a share. */
  readonly coefficientOfVariation: Figure;
  /** C, by which the log-normal limits are divided and multiplied. */
  readonly logNormalFactor: Figure;
  readonly total: Quantity;
  /** Mean per cell. */
  readonly mean: Quantity;
  /** Per hectare of the area spoken for. */
  readonly density: ({ readonly kind: "known"; readonly areaM2: number } & Quantity) | None;
  /** not-needed: something was found, or every cell of the frame was counted. */
  readonly allZero: AllZeroLimits | { readonly kind: "not-needed" };
  /** The number seen: the sum over distinct counted cells. The total can't be lower. */
  readonly seen: number;
  /** How many picks and cells are in each state, those in use and those closed together. */
  readonly states: readonly { readonly state: CountState; readonly picks: number; readonly cells: number }[];
  readonly missing: readonly MissingPick[];
  readonly missingBounds: MissingBounds | { readonly kind: "none-missing" };
  /** Picks with a value whose order is behind a pick in use that was not visited yet. */
  readonly countedOutOfOrder: number;
  /** The estimate if cells that were amended from a count to a closed state had kept their count. */
  readonly withAmendedAsCounted:
    | {
        readonly kind: "amended";
        readonly picks: number;
        readonly total: number;
        readonly mean: number;
        readonly standardErrorOfTotal: Figure;
      }
    | { readonly kind: "none-amended" };
  readonly farAbove: FarAbove | { readonly kind: "none-far-above" };
  readonly distribution: Distribution;
}
