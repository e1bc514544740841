import { levelPercent } from "./level.ts";
import { BEFORE_UNIT, countText, figuresText, numberText } from "#shared/units/number-text.ts";
import type { AllZeroLimits, EstimateResult } from "./result.ts";
import { estimateText, printedLimitsOf } from "./rounding.ts";

/** A piece of a sentence: the estimate and its limits are set apart from the rest. */
export interface SentencePart {
  readonly role: "plain" | "estimate" | "limit";
  readonly text: string;
}

export interface TargetWords {
  /** What is counted, in the plural: "flowering spikes". */
  readonly objects: string;
  /** What they do there; "are" where nothing is said. */
  readonly verb?: string;
}

const plain = (text: string): SentencePart => ({ role: "plain", text });
const limit = (text: string): SentencePart => ({ role: "limit", text });

/** "95 %" */
export function levelText(level: number): string {
  return `${levelPercent(level)}${BEFORE_UNIT}%`;
}

/** What the estimate speaks for: the ground inside the boundary, or the frame's cells. */
export function placeText(result: EstimateResult): string {
  return result.countIn === "inside" ? "in the study area" : "in the cells of the frame";
}

/** An upper limit as printed: up to the next whole number from 10 on, three figures below. */
export function upperLimitText(value: number): string {
  return value >= 10 ? numberText(Math.ceil(value)) : figuresText(value, 3);
}

function allZeroSentence(result: EstimateResult, zero: AllZeroLimits, words: TargetWords): SentencePart[] {
  return [
    plain("No "),
    { role: "estimate", text: words.objects },
    plain(` were found in ${countText(zero.cells, "cell")}. If they lie independently of each other, at most `),
    limit(upperLimitText(zero.twoSided)),
    plain(
      ` ${words.verb ?? "are"} ${placeText(result)}, with ${levelText(result.level)} confidence (two-sided; one-sided `,
    ),
    limit(upperLimitText(zero.oneSided)),
    plain(")."),
  ];
}

/** Why there are no limits, after the estimate. */
function withoutLimits(result: EstimateResult): string {
  const why = result.total.limits.t.kind === "none" ? result.total.limits.t.why : "too-wide";
  switch (why) {
    case "one-pick":
      return ", from a single cell: one cell tells nothing of precision, so there are no limits.";
    case "no-variation":
      return ". Every count is the same: the sample shows no variation, and limits would say nothing.";
    case "all-zero":
    case "mean-zero":
      return ". Every cell of the frame was counted, and none was found.";
    case "too-wide":
    case "no-area":
      return ". The limits are wider than any number.";
  }
}

/**
 * The answer in one sentence, in pieces: "About 2 930 flowering spikes are in the study area, with 95 % confidence limits of
 * 1 950 and 4 390." The limits are those declared with the draw.
 */
export function estimateSentence(result: EstimateResult, words: TargetWords): SentencePart[] {
  if (result.allZero.kind === "all-zero") return allZeroSentence(result, result.allZero, words);
  const verb = words.verb ?? "are";
  const { total } = result;
  const number: SentencePart = {
    role: "estimate",
    text: `${estimateText(total.estimate, total.standardError)} ${words.objects}`,
  };
  const where = ` ${verb} ${placeText(result)}`;
  if (result.complete) {
    return [number, plain(`${where}: every cell of the frame was counted, so nothing is estimated.`)];
  }
  const printed = printedLimitsOf(result, "total", result.declaredLimits);
  if (printed === "none") return [plain("About "), number, plain(`${where}${withoutLimits(result)}`)];
  return [
    plain("About "),
    number,
    plain(`${where}, with ${levelText(result.level)} confidence limits of `),
    limit(printed.lower),
    plain(" and "),
    limit(printed.upper),
    plain("."),
  ];
}

/** The sentence without its pieces. */
export function sentenceText(parts: readonly SentencePart[]): string {
  return parts.map((part) => part.text).join("");
}
