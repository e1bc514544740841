import { STATE_WORDS } from "#shared/counts/count.ts";
import { countText, figuresText, listText, numberText } from "#shared/units/number-text.ts";
import type { EstimateResult, MissingPick } from "./result.ts";
import { estimateText, printedLimitsOf } from "./rounding.ts";

/** Something to know about an estimate. "look" is for what may change how it is read. */
export interface EstimateNote {
  readonly key: string;
  readonly weight: "look" | "fact";
  readonly text: string;
}

const look = (key: string, text: string): EstimateNote => ({ key, weight: "look", text });
const fact = (key: string, text: string): EstimateNote => ({ key, weight: "fact", text });
const when = (condition: boolean, note: () => EstimateNote): EstimateNote[] => (condition ? [note()] : []);

const MOST_NAMED = 12;

/** "23 (AB16, refused) and 41 (Y12, not reached)": the picks without a value, by order, label and state. */
export function missingNames(missing: readonly MissingPick[]): string {
  const names = missing.slice(0, MOST_NAMED).map((pick) => `${pick.order} (${pick.label}, ${STATE_WORDS[pick.state]})`);
  const more = missing.length - MOST_NAMED;
  return listText(more > 0 ? [...names, `${numberText(more)} more`] : names);
}

function missingNote(result: EstimateResult): EstimateNote[] {
  const { missing, missingBounds: bounds, total } = result;
  if (bounds.kind === "none-missing") return [];
  const one = missing.length === 1;
  const closed = missing.filter((pick) => pick.closed).length;
  const all = one ? "it" : missing.length === 2 ? "both" : "all of them";
  const shown = (value: number) => estimateText(value, total.standardError);
  const of = numberText(result.picksInUse + closed);
  return [
    look(
      "missing",
      `${countText(missing.length, "pick")} of ${of} ${one ? "has" : "have"} no count: ${missingNames(missing)}. ` +
        `${one ? "It is no zero" : "They are not zeros"}. The estimate takes ${one ? "it" : "them"} to be like the rest. ` +
        `Had ${all} held none, it would be ${shown(bounds.atZero)}; had ${all} held ${figuresText(bounds.percentile, 6)}, ` +
        `the 95th percentile of the counts, ${shown(bounds.atPercentile)}.`,
    ),
  ];
}

function precisionNotes(result: EstimateResult): EstimateNote[] {
  const { total, declaredLimits, seen } = result;
  const t = total.limits.t;
  const printed = printedLimitsOf(result, "total", declaredLimits);
  return [
    ...when(t.kind === "none" && t.why === "one-pick", () =>
      look(
        "one-pick",
        "One cell tells nothing of precision: there is no standard error and there are no limits. Count a second pick.",
      ),
    ),
    ...when(t.kind === "none" && t.why === "no-variation", () =>
      look(
        "no-variation",
        "The standard error is 0 because the sample shows no variation; limits are not meaningful. Count more picks.",
      ),
    ),
    ...when(result.complete, () =>
      fact(
        "complete",
        "Every cell of the frame was counted: the standard error is 0, and only counting mistakes are left.",
      ),
    ),
    ...when(!result.complete && result.distinctCells >= result.units, () =>
      look(
        "all-seen",
        `Every cell of the frame was counted at least once: the total is the number seen, ${figuresText(seen, 12)}.`,
      ),
    ),
    ...when(t.kind === "interval" && t.lower < 0, () =>
      look(
        "t-below-zero",
        `The t limits reach below zero. With clumped counts the truth lies above such limits more often than the level says.`,
      ),
    ),
    ...when(printed !== "none" && printed.raised, () =>
      fact(
        "raised",
        `A limit under ${figuresText(seen, 12)}, the number seen, is printed as that number; files hold it as computed.`,
      ),
    ),
    ...when(total.estimate < seen, () =>
      look(
        "below-seen",
        `The estimate lies under ${figuresText(seen, 12)}, the number seen. The total is at least that.`,
      ),
    ),
    ...when(total.limits.logNormal.kind === "none" && total.limits.logNormal.why === "too-wide", () =>
      look("too-wide", "The log-normal limits are wider than any number. Count more picks."),
    ),
    ...when(result.allZero.kind === "all-zero", () =>
      look(
        "all-zero",
        "Every count is zero. The upper limits take the objects to lie independently (Poisson); clumped ones leave room for more.",
      ),
    ),
  ];
}

function pickNotes(result: EstimateResult): EstimateNote[] {
  const outside = result.states.find((entry) => entry.state === "not-in-population");
  const { farAbove: far, withAmendedAsCounted: amended, total } = result;
  return [
    ...when(result.picksCounted > result.distinctCells, () =>
      fact(
        "repeats",
        `${countText(result.picksCounted, "pick")} are of ${countText(result.distinctCells, "cell")}: a repeat's count enters each time it was picked.`,
      ),
    ),
    ...(outside === undefined
      ? []
      : [
          fact(
            "not-in-population",
            `${countText(outside.picks, "pick")}, ${countText(outside.cells, "cell")}, not in the population: each enters as 0, and the estimate speaks for the population inside the frame.`,
          ),
        ]),
    ...when(result.countedOutOfOrder > 0, () =>
      look(
        "out-of-order",
        `${countText(result.countedOutOfOrder, "pick")} behind the first unvisited one ${result.countedOutOfOrder === 1 ? "is" : "are"} counted already. Until those before are done, what was near or easy may weigh too much.`,
      ),
    ),
    ...(amended.kind === "none-amended"
      ? []
      : [
          look(
            "amended",
            `${countText(amended.picks, "pick")} had a count that was amended away. With it the total would be ${estimateText(amended.total, amended.standardErrorOfTotal)}; without, ${estimateText(total.estimate, total.standardError)}.`,
          ),
        ]),
    ...(far.kind === "none-far-above"
      ? []
      : [
          look(
            "far-above",
            `${far.label} has ${figuresText(far.value, 12)}, far above the next highest, ${figuresText(far.nextLargest, 12)}. It stays in. Without it the total would be ${estimateText(far.totalWithout, total.standardError)}. Check the sheet.`,
          ),
        ]),
  ];
}

/** What a reader of this estimate should know, what matters most first. */
export function estimateNotes(result: EstimateResult): EstimateNote[] {
  const notes = [...missingNote(result), ...precisionNotes(result), ...pickNotes(result)];
  return [...notes.filter((note) => note.weight === "look"), ...notes.filter((note) => note.weight === "fact")];
}
