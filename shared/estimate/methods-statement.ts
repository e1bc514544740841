import { STATE_WORDS } from "#shared/counts/count.ts";
import { countText, figuresText, listText, numberText, BEFORE_UNIT } from "#shared/units/number-text.ts";
import type { EstimateResult, LimitKind } from "./result.ts";
import { printedLimitsOf } from "./rounding.ts";
import { estimateSentence, levelText, sentenceText, type TargetWords } from "./sentence.ts";
import { missingNames } from "./notes.ts";
import { MONTHS } from "#shared/units/months.ts";

/** What a methods statement tells beside the estimate; all of it stands in the record. Times are ISO texts in UTC. */
export interface MethodsFacts {
  readonly survey: string;
  readonly season: string;
  readonly target: TargetWords;
  /** What one object is and which are counted, as the survey says; empty where it doesn't. */
  readonly countingRule: string;
  readonly frame: {
    readonly version: number;
    readonly crsName: string;
    readonly epsg: number | null;
    readonly cellWidthM: number;
    readonly cellHeightM: number;
    readonly membership: "touch" | "centre" | "inside" | "share";
    /** The least share of a cell, where membership is by share. */
    readonly atLeastShare?: number;
    readonly areaM2: number;
    readonly uncoveredM2: number;
    readonly cellsLeftOut: number;
    readonly sha256: string;
    readonly sealedAt: string;
  };
  readonly draw: {
    readonly number: number;
    readonly picks: number;
    readonly reserves: number;
    /** Entries by which the list was lengthened after its reserves were used up. */
    readonly added: number;
    readonly generator: string;
    readonly seed: string;
    readonly seedSource: { readonly kind: "made-here" } | { readonly kind: "typed"; readonly by: string };
    readonly declaredAt: string;
    readonly drawnAt: string;
    /** Other draws and declarations on record for this survey and season. */
    readonly withdrawn: number;
    readonly abandoned: number;
  };
  /** The limits were declared before the first count. */
  readonly limitsDeclared: boolean;
  /** Days of the first and the last count; empty texts while there is none. */
  readonly counted: { readonly from: string; readonly to: string; readonly observers: number };
  readonly software: { readonly name: string; readonly version: string };
}

/** "2031-06-03T09:12:00Z" as "3 June 2031". Throws RangeError for another form. */
function dayText(iso: string): string {
  const found = /^(\d{4})-(\d{2})-(\d{2})/.exec(iso);
  const month = MONTHS[Number(found?.[2]) - 1];
  if (found === null || month === undefined) throw new RangeError(`cannot read "${iso}" as a day`);
  return `${Number(found[3])} ${month} ${found[1] ?? ""}`;
}

const hectares = (areaM2: number): string => `${numberText(areaM2 / 10_000, 2)}${BEFORE_UNIT}ha`;
const asIs = (value: number): string => figuresText(value, 12);

/** Text of people inside Markdown: what would be read as its marks is escaped. */
function markdown(text: string): string {
  return text.replaceAll(/[\\`*_[\]<>#|]/g, (mark) => `\\${mark}`).replaceAll(/\s*\n\s*/g, " ");
}

/** Text between back quotes, which Markdown shows as it is, with as many of them as it takes. */
function code(text: string): string {
  const longest = (text.match(/`+/g) ?? []).reduce((most, run) => Math.max(most, run.length), 0);
  const fence = "`".repeat(longest + 1);
  return longest === 0 ? `${fence}${text}${fence}` : `${fence} ${text} ${fence}`;
}

function membershipText({ membership, atLeastShare }: MethodsFacts["frame"]): string {
  switch (membership) {
    case "touch":
      return "every cell that touches the study area";
    case "centre":
      return "every cell whose centre is in the study area";
    case "inside":
      return "every cell that lies wholly inside the study area";
    case "share":
      return `every cell with at least ${asIs(atLeastShare ?? 0)} of its area in the study area`;
  }
}

function frameText({ frame }: MethodsFacts, result: EstimateResult): string {
  const crs = frame.epsg === null ? frame.crsName : `${frame.crsName} (EPSG:${frame.epsg})`;
  const size = `${asIs(frame.cellWidthM)} × ${asIs(frame.cellHeightM)}${BEFORE_UNIT}m`;
  const counting = result.countIn === "inside" ? "inside the boundary only" : "in the whole cell";
  const speaks = result.density.kind === "known" ? `The estimate speaks for ${hectares(result.density.areaM2)}.` : "";
  return [
    `The study area has ${hectares(frame.areaM2)} in ${markdown(crs)}.`,
    `The sampling frame, version ${frame.version}, sealed on ${dayText(frame.sealedAt)}, is a grid of ${size} cells and holds ${membershipText(frame)}: N = ${numberText(result.units)}.`,
    `Objects were counted ${counting}. ${speaks}`.trim(),
    frame.uncoveredM2 > 0 ? `${hectares(frame.uncoveredM2)} of the study area lie in no cell of the frame.` : "",
    frame.cellsLeftOut > 0
      ? `${countText(frame.cellsLeftOut, "cell")} were left out before the draw, with reasons on record.`
      : "",
    `Frame hash (SHA-256): ${code(frame.sha256)}.`,
  ]
    .filter((sentence) => sentence !== "")
    .join(" ");
}

function seedText({ draw }: MethodsFacts): string {
  const seed = code(draw.seed);
  if (draw.seedSource.kind === "made-here") {
    return `The seed ${seed} was made by the server's random source after the declaration.`;
  }
  return `The seed ${seed} was chosen by ${markdown(draw.seedSource.by)}; nothing shows that only one was tried.`;
}

function drawText(facts: MethodsFacts, result: EstimateResult): string {
  const { draw } = facts;
  const replacement =
    result.design === "srs-wr"
      ? "with replacement, so that a cell can be picked more than once and then enters as often"
      : "without replacement";
  const others = [
    ...(draw.withdrawn > 0 ? [`${countText(draw.withdrawn, "other draw")} withdrawn`] : []),
    ...(draw.abandoned > 0 ? [`${countText(draw.abandoned, "declaration")} abandoned`] : []),
  ];
  return [
    `The draw was declared on ${dayText(draw.declaredAt)}, after the frame was sealed and before there was a seed, and made on ${dayText(draw.drawnAt)}.`,
    `It is a simple random sample of ${countText(draw.picks, "pick")} ${replacement}, with ${countText(draw.reserves, "reserve")} in the same stream (generator ${code(draw.generator)}).`,
    draw.added === 0
      ? ""
      : `When these were used up the list was lengthened by ${countText(draw.added, "entry", "entries")} of the same stream.`,
    seedText(facts),
    others.length === 0 ? "It is the only draw of this season." : `On record beside it: ${listText(others)}.`,
  ]
    .filter((sentence) => sentence !== "")
    .join(" ");
}

function countsText({ counted, countingRule }: MethodsFacts, result: EstimateResult): string {
  const states = result.states.map((entry) => `${numberText(entry.picks)} ${STATE_WORDS[entry.state]}`);
  const when =
    counted.from === ""
      ? ""
      : ` between ${dayText(counted.from)} and ${dayText(counted.to)} by ${countText(counted.observers, "observer")}`;
  const { missing, missingBounds: bounds } = result;
  return [
    countingRule === "" ? "" : markdown(countingRule),
    `${countText(result.distinctCells, "cell")} were counted${when}, which are ${countText(result.picksCounted, "pick")}. Picks by state: ${listText(states)}.`,
    missing.length === 0 || bounds.kind === "none-missing"
      ? ""
      : `Without a count: picks ${markdown(missingNames(missing))}. The estimate takes them to be like the rest. With each of them at zero the total would be ${figuresText(bounds.atZero, 4)}, with each at the 95th percentile of the counts (${asIs(bounds.percentile)}) ${figuresText(bounds.atPercentile, 4)}.`,
  ]
    .filter((sentence) => sentence !== "")
    .join(" ");
}

const LIMIT_WORDS: Record<LimitKind, string> = {
  "log-normal": "log-normal limits, T / C and T · C with C = exp(t · √(ln(1 + cv²)))",
  t: "Student t limits, T ∓ t · SE(T)",
};

function estimateMethod({ limitsDeclared }: MethodsFacts, result: EstimateResult): string {
  const variance = result.design === "srs-wr" ? "N² · s² / n" : "N² · (1 − n/N) · s² / n";
  const chosen = limitsDeclared ? "declared with the draw" : "chosen after counts were seen";
  const other: LimitKind = result.declaredLimits === "t" ? "log-normal" : "t";
  const beside = printedLimitsOf(result, "total", other);
  return [
    `The total is T = N · ȳ over the n = ${numberText(result.picksCounted)} picks, its variance ${variance} with s² over n − 1.`,
    `Limits are ${levelText(result.level)} ${LIMIT_WORDS[result.declaredLimits]}, from ${countText(result.degreesOfFreedom, "degree")} of freedom, ${chosen}.`,
    beside === "none"
      ? ""
      : `The ${other === "t" ? "t" : "log-normal"} limits beside them are ${beside.lower} and ${beside.upper}.`,
  ]
    .filter((sentence) => sentence !== "")
    .join(" ");
}

/**
 * A methods statement in Markdown, for a report: what was estimated, for what ground, by which frame, draw, counts and
 * formula, and what is missing. Made from the record alone, the same from the same record.
 */
export function methodsStatement(facts: MethodsFacts, result: EstimateResult): string {
  const sentence = sentenceText(estimateSentence(result, facts.target));
  return [
    `# Methods: ${markdown(facts.survey)}, ${markdown(facts.season)}`,
    markdown(sentence),
    `## Frame\n\n${frameText(facts, result)}`,
    `## Draw\n\n${drawText(facts, result)}`,
    `## Counts\n\n${countsText(facts, result)}`,
    `## Estimate\n\n${estimateMethod(facts, result)}`,
    `Computed with ${markdown(facts.software.name)} ${markdown(facts.software.version)}. The record file of the survey repeats frame, draw and estimate.`,
    "",
  ].join("\n\n");
}
