import type { EstimateResult } from "#shared/estimate/result.ts";
import { Problem } from "#shared/problem.ts";
import { canonicalSha256 } from "#shared/record/chain.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import {
  type Check,
  counted,
  differ,
  type Difference,
  failed,
  firstDifference,
  notChecked,
  passed,
  type ReplayRun,
  verdict,
} from "./check.ts";
import { placesOf, said } from "./counts.ts";
import { type EstimateOf, estimateAgain, liveDrawAt } from "./estimate-again.ts";

type Kept = RecordFile["estimates"][number];

/** Two computers may add in another order; more than this is another result. */
export const RELATIVE_TOLERANCE = 1e-9;

const COUNT_KINDS = ["count-entered", "count-amended", "pick-closed", "draw-made", "draw-withdrawn"] as const;

/**
 * Each kept estimate is the one whose hash its event holds, and follows from the counts as they stood then; and the
 * newest one of each target still follows from the counts as they stand now.
 */
export function checkEstimates(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(["estimate-kept", ...COUNT_KINDS]);
  const { estimates } = run.record;
  const each = estimates.map((kept, place) => {
    run.tell();
    const id = `estimate-${place + 1}`;
    const title = `Estimate ${place + 1}, kept ${kept.keptAt.slice(0, 10)}, follows from the counts of that time`;
    if (broken !== null) return notChecked(id, title, `Not compared: ${broken} is not whole.`);
    return checkKept(run, kept, id, title);
  });
  return [...each, ...missingEstimates(run, broken), ...currentEstimates(run, broken)];
}

function checkKept(run: ReplayRun, kept: Kept, id: string, title: string): Check {
  const event = run.events.of("estimate-kept").find(({ payload }) => payload.estimateId === kept.id);
  const stored = firstDifference([
    () => differ("the estimate, hash of its result", canonicalSha256(kept.result), event?.payload.resultSha256),
    () => differ("the estimate, target", kept.targetId, event?.payload.targetId),
    () => differ("the estimate, season", kept.seasonId, event?.payload.seasonId),
    () => differ("the estimate, kept at", kept.keptAt, event?.at),
    () => differ("the estimate, kept by", kept.member, event?.member),
  ]);
  if (stored !== null) return failed(id, title, stored);
  const again = attempt(run, { ...kept, until: event?.sequence ?? 0 });
  if (again === null) return notChecked(id, title, "The frame or the draw that it stands on could not be made again.");
  if (again instanceof Problem) {
    return failed(id, title, { where: "the estimate", found: "one", expected: `none: ${again.message}` });
  }
  const difference = firstDifference([
    () => differInValue("", kept.result, JSON.parse(JSON.stringify(again))),
    () => differ("settings, limits", kept.settings["limits"], again.declaredLimits),
    () => differ("settings, level", Number(kept.settings["level"]), again.level),
  ]);
  return verdict(id, title, difference, `${inWords(again)}${chosenLate(run, kept, event?.sequence ?? 0)}`);
}

/** Rule R7: what was declared after the first count of its season is said to be chosen after counts were seen. */
function chosenLate(run: ReplayRun, { seasonId, targetId }: Kept, until: number): string {
  const live = liveDrawAt(run, { seasonId, targetId, until });
  const declared = run.events.of("draw-declared").find(({ payload }) => payload.declarationId === live?.stored.id);
  const seasonOf = new Map(run.record.visits.map((visit) => [visit.id, visit.seasonId]));
  const first = run.events.of("count-entered").find(({ payload }) => seasonOf.get(payload.visitId) === seasonId);
  if (declared === undefined || first === undefined || declared.sequence < first.sequence) return "";
  return `. Limits and level were declared in event ${declared.sequence}, after the first count in event ${first.sequence}: chosen after counts were seen`;
}

/** An event of an estimate that the list leaves out. */
function missingEstimates(run: ReplayRun, broken: string | null): Check[] {
  const listed = new Set(run.record.estimates.map(({ id }) => id));
  const missing = run.events.of("estimate-kept").find(({ payload }) => !listed.has(payload.estimateId));
  if (broken !== null || missing === undefined) return [];
  const difference = { where: "estimates", found: "none", expected: `the estimate of event ${missing.sequence}` };
  return [failed("estimates", "Every kept estimate is told", difference)];
}

/** The newest kept estimate of each target and season against what the counts give now. */
function currentEstimates(run: ReplayRun, broken: string | null): Check[] {
  const { survey } = run.record;
  return survey.seasons.flatMap((season) =>
    survey.targets.flatMap((target) => {
      const several = survey.targets.length * survey.seasons.length > 1;
      const title = `The newest estimate follows from the counts${several ? ` (${target.plural}, ${season.name})` : ""}`;
      const id = several ? `current-${season.id}-${target.id}` : "current-estimate";
      if (broken !== null) return [notChecked(id, title, `Not compared: ${broken} is not whole.`)];
      return [checkCurrent(run, { seasonId: season.id, targetId: target.id, until: Infinity }, id, title)];
    }),
  );
}

function checkCurrent(run: ReplayRun, of: EstimateOf, id: string, title: string): Check {
  const again = attempt(run, of);
  if (again === null) return notChecked(id, title, "There is no live draw, or it could not be made again.");
  if (again instanceof Problem) return notChecked(id, title, again.message);
  const now = `From all counts: ${inWords(again)}`;
  const kept = run.record.estimates.findLast((one) => one.seasonId === of.seasonId && one.targetId === of.targetId);
  const event = run.events.of("estimate-kept").find(({ payload }) => payload.estimateId === kept?.id);
  if (kept === undefined || event === undefined) return passed(id, title, `None is kept yet. ${now}`);
  const since = eventsSince(run, event.sequence);
  const [amended] = since.filter(({ kind }) => kind === "count-amended");
  const then = attempt(run, { ...of, until: event.sequence });
  if (then === null || then instanceof Problem) return notChecked(id, title, "The newest kept one does not follow.");
  const difference = differInValue("", headOf(then), headOf(again));
  if (difference === null) return passed(id, title, now);
  if (since.length > 0 && amended === undefined) {
    return passed(id, title, `The newest kept one is older than ${counted(since.length, "entry", "entries")}. ${now}`);
  }
  const why =
    amended === undefined ? "" : `${amended.story} The estimate of event ${event.sequence} is older than that. `;
  return failed(id, title, difference, `${why}Ask the planner to keep the estimate again. ${now}.`);
}

/** Counts and closings after an event, the first first. */
function eventsSince(run: ReplayRun, sequence: number): { sequence: number; kind: string; story: string }[] {
  const places = placesOf(run);
  const before = new Map(run.record.counts.map((count) => [count.id, count]));
  const entered = run.events.of("count-entered").map((event) => ({ ...event, kind: "count-entered" }));
  const amended = run.events.of("count-amended").map((event) => ({ ...event, kind: "count-amended" }));
  return [...entered, ...amended]
    .filter((event) => event.sequence > sequence)
    .toSorted((a, b) => a.sequence - b.sequence)
    .map(({ sequence: place, at, kind, payload }) => {
      const old = before.get(payload.replaces ?? "");
      const from = old === undefined ? "" : `, amended from ${said(old)}: “${payload.reason}”`;
      const where = places.get(payload.visitId) ?? `unit ${payload.unit}`;
      return { sequence: place, kind, story: `${where} holds ${said(payload)} since event ${place}, ${at}${from}.` };
    });
}

function attempt(run: ReplayRun, of: EstimateOf): EstimateResult | Problem | null {
  try {
    return estimateAgain(run, of);
  } catch (error) {
    if (error instanceof Problem && error.code !== "cancelled") return error;
    throw error;
  }
}

/** What people read first: the mean, then what follows from it. */
function headOf({ mean, total, density }: EstimateResult): unknown {
  return { mean, total, density };
}

function inWords({ total, mean, picksCounted, picksInUse }: EstimateResult): string {
  const error = total.standardError.kind === "known" ? `, standard error ${short(total.standardError.value)}` : "";
  return `total ${short(total.estimate)}${error}; mean per cell ${short(mean.estimate)} from ${picksCounted} of ${picksInUse} picks`;
}

const short = (value: number): string => String(Number(value.toPrecision(6)));

/** The first member, in the order of `expected`, where two JSON values are not the same; numbers within the tolerance. */
function differInValue(path: string, found: unknown, expected: unknown): Difference | null {
  const where = path === "" ? "the estimate" : path;
  if (typeof found === "number" && typeof expected === "number") {
    const near = Math.abs(found - expected) <= RELATIVE_TOLERANCE * Math.max(Math.abs(found), Math.abs(expected));
    return near ? null : { where, found: String(found), expected: String(expected) };
  }
  if (!isObject(found) || !isObject(expected)) return differ(where, found, expected);
  const names = [...new Set([...Object.keys(expected), ...Object.keys(found)])];
  return firstDifference(
    names.map((name) => () => differInValue(path === "" ? name : `${path}, ${name}`, found[name], expected[name])),
  );
}

function isObject(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === "object" && value !== null;
}
