import { seedSourceSentence } from "#shared/draw/declaration.ts";
import { type DrawRecipe, drawRecipe } from "#shared/draw/recipe.ts";
import type { Check, ReplayRun } from "./checks/check.ts";
import { declaredOf, nameOf } from "./checks/declared.ts";
import { keyFingerprint } from "./sign.ts";

export interface ReplaySummary {
  /** "11 of 12 checks pass." and what that means, in a sentence each. */
  readonly headline: string;
  readonly meaning: string;
  readonly passed: number;
  readonly failed: number;
  readonly notChecked: number;
  readonly survey: string;
  readonly target: string;
  readonly season: string;
  readonly exportedAt: string;
  readonly software: string;
  readonly fingerprint: string;
  /** N of the frame that was used last; 0 where there is none. */
  readonly units: number;
  readonly picks: number;
  readonly counted: number;
  readonly declarations: number;
  readonly draws: number;
  readonly newest: { readonly sequence: number; readonly sha256: string } | null;
  readonly seeds: readonly { readonly of: string; readonly text: string; readonly sentence: string }[];
  /** The newest draw by tools that are not ours. */
  readonly recipe: DrawRecipe | null;
}

export const summaryOfNothing: ReplaySummary = {
  headline: "This is not a record file.",
  meaning: "Nothing was checked.",
  passed: 0,
  failed: 1,
  notChecked: 0,
  survey: "",
  target: "",
  season: "",
  exportedAt: "",
  software: "",
  fingerprint: "",
  units: 0,
  picks: 0,
  counted: 0,
  declarations: 0,
  draws: 0,
  newest: null,
  seeds: [],
  recipe: null,
};

export function summarise(run: ReplayRun, checks: readonly Check[]): ReplaySummary {
  const { record } = run;
  const number = (outcome: Check["outcome"]): number => checks.filter((check) => check.outcome === outcome).length;
  const newest = record.events.at(-1);
  const declared = declaredOf(record, run.events);
  const last = declared.findLast(({ draw }) => draw !== null);
  const made = number("passed") + number("failed");
  return {
    headline: `${number("passed")} of ${made} checks pass.`,
    meaning: meaningOf(checks),
    passed: number("passed"),
    failed: number("failed"),
    notChecked: number("not-checked"),
    survey: record.survey.name,
    target: record.survey.targets[0]?.plural ?? "",
    season: record.survey.seasons.at(-1)?.name ?? "",
    exportedAt: record.exportedAt,
    software: `${record.software.name} ${record.software.version}`,
    fingerprint: keyFingerprint(record.publicKey),
    units: [...run.frames.values()].at(-1)?.sealedUnits ?? 0,
    picks: last?.draw?.lists.reduce((sum, { entries }) => sum + entries.filter((e) => !e.reserve).length, 0) ?? 0,
    counted: countedCells(run),
    declarations: record.declarations.length,
    draws: record.draws.length,
    newest: newest === undefined ? null : { sequence: newest.envelope.sequence, sha256: newest.sha256 },
    seeds: declared.flatMap(({ name, stored: { seed }, value }) =>
      seed === null || value === null
        ? []
        : [{ of: name, text: seed.text, sentence: seedSourceSentence(value.seedSource, nameOf(record, seed.member)) }],
    ),
    recipe: recipeOf(run),
  };
}

/** Cells with a first count in force that is a number. */
function countedCells(run: ReplayRun): number {
  const replaced = new Set(run.record.counts.map(({ replaces }) => replaces));
  return new Set(
    run.record.counts
      .filter(({ id, purpose, state }) => !replaced.has(id) && purpose === "first" && state === "counted")
      .map(({ visitId }) => visitId),
  ).size;
}

const GROUPS: readonly { readonly ids: RegExp; readonly held: string; readonly broken: string }[] = [
  {
    ids: /^(chain|payloads|signatures|held-hashes)$/,
    held: "the record is whole",
    broken: "the record is not as it was written",
  },
  {
    ids: /^(frame|area|source)/,
    held: "the frame follows from its rings",
    broken: "the frame is not the one that was sealed",
  },
  {
    ids: /^(declarations|order|seed|draw-|told)/,
    held: "the draw is proven",
    broken: "the draw is not proven",
  },
  {
    ids: /^(reserves|visits|assignments|counts|amendments|survey)$/,
    held: "the counts are those that were entered",
    broken: "what was done in the field is not what the events say",
  },
  {
    ids: /^(estimate|current)/,
    held: "the estimate follows from the counts",
    broken: "the printed estimate does not follow from the counts in the record",
  },
];

/** What holds, then what does not, in one sentence. */
function meaningOf(checks: readonly Check[]): string {
  const of = (ids: RegExp): Check[] => checks.filter(({ id, outcome }) => ids.test(id) && outcome !== "not-checked");
  const broken = GROUPS.filter(({ ids }) => of(ids).some(({ outcome }) => outcome === "failed"));
  const held = GROUPS.filter((group) => !broken.includes(group) && of(group.ids).length > 0);
  if (checks.some(({ id, outcome }) => id === "format" && outcome === "failed")) {
    return "The parts of the record do not fit together.";
  }
  const parts = broken.length === 0 ? held.map((group) => group.held) : broken.map((group) => group.broken);
  if (broken.length > 0 && held.some(({ held: text }) => text === "the draw is proven"))
    parts.unshift("the draw is proven");
  const sentence = parts.join("; ");
  return sentence === "" ? "There is little in it yet." : `${sentence.charAt(0).toUpperCase()}${sentence.slice(1)}.`;
}

function recipeOf(run: ReplayRun): DrawRecipe | null {
  const { record } = run;
  const last = declaredOf(record, run.events).findLast(({ draw }) => draw !== null);
  const frame = run.frames.get(last?.stored.frameId ?? "");
  const seed = last?.stored.seed;
  if (!last?.value || !seed || frame?.sealedSha256 == null || frame.sealedUnits === null) return null;
  const { design, generator, reserves } = last.value;
  try {
    return drawRecipe({
      frameSha256: frame.sealedSha256,
      units: frame.sealedUnits,
      design,
      seed: seed.text,
      generator,
      reserves,
    });
  } catch {
    return null; // a seed that cannot be used: the draw's own check says so
  }
}
