import type { AllZeroLimits, EstimateResult, Figure, Quantity } from "#shared/estimate/result.ts";
import { estimateText, printedLimitsOf } from "#shared/estimate/rounding.ts";
import { upperLimitText } from "#shared/estimate/sentence.ts";
import { formatPercent, formatSignificant } from "../../components/ui/format.ts";

/** Why there is no figure, in the place of the figure. */
const NONE_WORDS = {
  "one-pick": "one pick only",
  "no-variation": "no variation",
  "all-zero": "none found",
  "mean-zero": "mean is zero",
  "too-wide": "too wide",
  "no-area": "no area",
} as const;

export function figureText(figure: Figure, format: (value: number) => string): string {
  return figure.kind === "known" ? format(figure.value) : NONE_WORDS[figure.why];
}

/** One quantity of the table: the estimate with its error and the limits of both kinds, as printed. */
export interface FiguresRow {
  readonly name: string;
  readonly unit: string;
  readonly strong: boolean;
  readonly estimate: string;
  readonly standardError: string;
  readonly lower: string;
  readonly upper: string;
}

export function figuresRows(result: EstimateResult, plural: string): FiguresRow[] {
  const { declaredLimits, density } = result;
  const other = declaredLimits === "t" ? "log-normal" : "t";
  const limitsName = { t: "t limits", "log-normal": "log-normal limits" } as const;
  const rows: FiguresRow[] = [
    ...(result.allZero.kind === "all-zero"
      ? zeroRows(result.allZero, plural)
      : [
          row(result, "total", declaredLimits, `Total, ${limitsName[declaredLimits]}`, plural, true),
          row(result, "total", other, `Total, ${limitsName[other]}`, plural, false),
        ]),
    row(result, "mean", declaredLimits, "Mean per cell", `${plural} per cell`, false),
  ];
  return density.kind === "known"
    ? [...rows, row(result, "density", declaredLimits, "Density", `${plural} per ha`, false)]
    : rows;
}

/** Where every count is zero: a total of none, and how many there may be under the model all the same. */
function zeroRows({ oneSided, twoSided }: AllZeroLimits, plural: string): FiguresRow[] {
  const none = { unit: plural, estimate: "0", standardError: NONE_WORDS["all-zero"], lower: "0" };
  return [
    { ...none, name: "Total, Poisson limit, two-sided", strong: true, upper: upperLimitText(twoSided) },
    { ...none, name: "Total, Poisson limit, one-sided", strong: false, upper: upperLimitText(oneSided) },
  ];
}

function row(
  result: EstimateResult,
  which: "total" | "mean" | "density",
  kind: "t" | "log-normal",
  name: string,
  unit: string,
  strong: boolean,
): FiguresRow {
  const quantity = quantityOf(result, which);
  const limits = printedLimitsOf(result, which, kind);
  const raw = kind === "t" ? quantity.limits.t : quantity.limits.logNormal;
  const none = raw.kind === "none" ? NONE_WORDS[raw.why] : "";
  return {
    name,
    unit,
    strong,
    estimate: estimateText(quantity.estimate, quantity.standardError),
    standardError: figureText(quantity.standardError, (value) => formatSignificant(value, 3)),
    lower: limits === "none" ? none : limits.lower,
    upper: limits === "none" ? none : limits.upper,
  };
}

function quantityOf(result: EstimateResult, which: "total" | "mean" | "density"): Quantity {
  if (which !== "density") return result[which];
  if (result.density.kind === "none") throw new RangeError("there is no density without areas");
  return result.density;
}

export function cvText(result: EstimateResult): string {
  return figureText(result.coefficientOfVariation, (value) => formatPercent(value));
}
