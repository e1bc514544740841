import { levelText } from "./sentence.ts";
import { figuresText } from "#shared/units/number-text.ts";
import type { EstimateResult, Figure, Limits } from "./result.ts";

/** One line of the working: symbol = formula = formula with its values = result. A root is written √(…). */
export interface FormulaLine {
  readonly key:
    | "mean"
    | "variance"
    | "total"
    | "standardErrorOfMean"
    | "standardErrorOfTotal"
    | "coefficientOfVariation"
    | "tQuantile"
    | "logNormalFactor"
    | "tLimits"
    | "logNormalLimits"
    | "density"
    | "allZeroOneSided"
    | "allZeroTwoSided";
  readonly symbol: string;
  readonly formula: string;
  readonly substituted: string;
  readonly result: string;
}

const FIGURES = 6;
const text = (value: number): string => figuresText(value, FIGURES);

function line(
  key: FormulaLine["key"],
  symbol: string,
  formula: string,
  substituted: string,
  result: string,
): FormulaLine {
  return { key, symbol, formula, substituted, result };
}

/** Sum of the counts of all picks, as the mean has it. */
const sumText = (result: EstimateResult): string => text(result.mean.estimate * result.picksCounted);

function errorLines(result: EstimateResult): FormulaLine[] {
  const { sampleVariance, picksCounted: n, units, mean, total } = result;
  if (mean.standardError.kind === "none" || total.standardError.kind === "none") return [];
  const variance = sampleVariance.kind === "known" ? text(sampleVariance.value) : "0";
  const [formula, substituted] =
    result.design === "srs-wr"
      ? ["√(s² / n)", `√(${variance} / ${n})`]
      : ["√((1 − n/N) · s² / n)", `√((1 − ${n}/${text(units)}) × ${variance} / ${n})`];
  const error = text(mean.standardError.value);
  return [
    ...(sampleVariance.kind === "known"
      ? [line("variance", "s²", "Σ(y − ȳ)² / (n − 1)", `Σ(y − ${text(mean.estimate)})² / ${n - 1}`, variance)]
      : []),
    line("standardErrorOfMean", "SE(ȳ)", formula, substituted, error),
    line("standardErrorOfTotal", "SE(T)", "N · SE(ȳ)", `${text(units)} × ${error}`, text(total.standardError.value)),
  ];
}

function variationLine(result: EstimateResult): FormulaLine[] {
  const { coefficientOfVariation: variation, total } = result;
  if (variation.kind === "none" || total.standardError.kind === "none") return [];
  const values = `${text(total.standardError.value)} / ${text(total.estimate)}`;
  return [line("coefficientOfVariation", "cv", "SE(T) / T", values, text(variation.value))];
}

const known = (figure: Figure): figure is Extract<Figure, { kind: "known" }> => figure.kind === "known";
const both = (limits: Limits): string =>
  limits.kind === "interval" ? `${text(limits.lower)} and ${text(limits.upper)}` : "";

function limitLines(result: EstimateResult): FormulaLine[] {
  const { total, tQuantile: t, logNormalFactor: factor, coefficientOfVariation: variation } = result;
  const { t: tLimits, logNormal } = total.limits;
  if (result.complete || tLimits.kind === "none" || !known(t) || !known(total.standardError)) return [];
  const [estimate, error] = [text(total.estimate), text(total.standardError.value)];
  const lines = [
    line(
      "tQuantile",
      "t",
      "t(level, n − 1)",
      `t(${levelText(result.level)}, ${result.degreesOfFreedom})`,
      text(t.value),
    ),
    line("tLimits", "t limits", "T ∓ t · SE(T)", `${estimate} ∓ ${text(t.value)} × ${error}`, both(tLimits)),
  ];
  if (logNormal.kind === "none" || !known(factor) || !known(variation)) return lines;
  const c = text(factor.value);
  return [
    ...lines,
    line(
      "logNormalFactor",
      "C",
      "exp(t · √(ln(1 + cv²)))",
      `exp(${text(t.value)} × √(ln(1 + ${text(variation.value)}²)))`,
      c,
    ),
    line(
      "logNormalLimits",
      "log-normal limits",
      "T / C and T · C",
      `${estimate} / ${c} and ${estimate} × ${c}`,
      both(logNormal),
    ),
  ];
}

function zeroLines(result: EstimateResult): FormulaLine[] {
  if (result.allZero.kind !== "all-zero") return [];
  const { cells, oneSided, twoSided } = result.allZero;
  const alpha = text(1 - result.level);
  const n = text(result.units);
  return [
    line(
      "allZeroTwoSided",
      "upper limit, two-sided",
      "N · (−ln(α/2)) / m",
      `${n} × (−ln(${alpha}/2)) / ${cells}`,
      text(twoSided),
    ),
    line(
      "allZeroOneSided",
      "upper limit, one-sided",
      "N · (−ln α) / m",
      `${n} × (−ln ${alpha}) / ${cells}`,
      text(oneSided),
    ),
  ];
}

/**
 * How the number is made: each step as symbol, formula, the formula with this estimate's values, and what comes out, to six
 * figures. N cells in the frame, n picks with a value, y their counts, T the total, A the area spoken for, m distinct cells.
 */
export function formulaLines(result: EstimateResult): FormulaLine[] {
  const { units, picksCounted: n, mean, total, density } = result;
  return [
    line("mean", "ȳ", "Σy / n", `${sumText(result)} / ${n}`, text(mean.estimate)),
    line("total", "T", "N · ȳ", `${text(units)} × ${text(mean.estimate)}`, text(total.estimate)),
    ...errorLines(result),
    ...variationLine(result),
    ...limitLines(result),
    ...zeroLines(result),
    ...(density.kind === "known"
      ? [
          line(
            "density",
            "D",
            "T / A, per hectare",
            `${text(total.estimate)} / ${text(density.areaM2 / 10_000)} ha`,
            text(density.estimate),
          ),
        ]
      : []),
  ];
}
