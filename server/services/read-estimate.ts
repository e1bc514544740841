import type { CellCount } from "#shared/counts/count.ts";
import type { Declaration } from "#shared/draw/declaration.ts";
import { type DrawnPick, type EstimateInput, estimateFromCounts } from "#shared/estimate/from-counts.ts";
import type { EstimateResult } from "#shared/estimate/result.ts";
import { isClosing } from "#shared/field/states.ts";
import { Problem } from "#shared/problem.ts";
import { canonicalSha256 } from "#shared/record/chain.ts";
import type { Context } from "../context.ts";
import { type CountRow, firstCountAt, firstCountsOf } from "../db/counts.ts";
import type { DrawState } from "../db/draws.ts";
import { type EventRow, newestEvent } from "../db/events.ts";
import { type FrameHead, findFrameHead, specOf, summaryOf } from "../db/frames.ts";
import type { Reader } from "../db/open.ts";
import { currentSeason, type SeasonRow, type TargetRow } from "../db/surveys.ts";
import { visitsOn } from "../db/visits.ts";
import type { StratumInUse } from "./draw-in-use.ts";
import { bringsValue } from "./keep-entry.ts";
import { declaredText, neededDeclaration, seedShown, type DeclarationView } from "./read-draws.ts";
import { memberNames } from "../db/members.ts";
import { seasonInUse } from "./read-visits.ts";

/** The estimate of a season's first target, with what it stands on. */
export interface EstimateView {
  readonly result: EstimateResult;
  readonly resultSha256: string;
  readonly season: SeasonRow;
  readonly target: TargetRow;
  readonly frame: FrameHead;
  readonly draw: DrawState;
  readonly declaration: DeclarationView;
  readonly lists: readonly StratumInUse[];
  /** By unit: the entry in force, and the number that was in force before it where it took one away. */
  readonly standing: ReadonlyMap<number, CountStanding>;
  readonly chosenAfterCounts: readonly ("limits" | "level")[];
  readonly firstCountAt: string | null;
  readonly newest: EventRow;
}

export interface CountStanding {
  readonly entry: CountRow;
  readonly countedBefore: number | null;
}

/**
 * The estimate from the counts in force, level and limits as declared with the draw.
 * @throws Problem `draw-missing`, and `estimate-impossible` while there is no count
 */
export function readEstimate(ctx: Context, reader: Reader = ctx.db): EstimateView {
  const { seasonId, target, live, lists } = seasonInUse(reader, ctx.surveyId);
  if (!live) throw new Problem("draw-missing", "An estimate follows from a draw and its counts. Draw cells first.");
  const frame = findFrameHead(reader, live.draw.frameVersionId);
  const newest = newestEvent(reader, ctx.surveyId);
  if (!frame || !newest) throw new Error(`draw ${live.draw.id} has no frame or no event`);
  const state = neededDeclaration(reader, live.draw.declarationId);
  const declared = declaredText(state);
  const standing = standingCounts(reader, seasonId, frame.id, target.id);
  const result = estimateFromCounts(inputOf(declared, state.units, frame, lists, standing));
  const first = firstCountAt(reader, seasonId);
  const late = first !== null && state.declaration.declaredAt > first;
  return {
    result,
    resultSha256: canonicalSha256(result),
    season: currentSeason(reader, ctx.surveyId),
    target,
    frame,
    draw: live,
    declaration: { state, declared, names: memberNames(reader, ctx.surveyId), seedShown: seedShown(ctx) },
    lists,
    standing,
    chosenAfterCounts: late ? ["limits", "level"] : [],
    firstCountAt: first,
    newest,
  };
}

function inputOf(
  declared: Declaration,
  units: number,
  frame: FrameHead,
  lists: readonly StratumInUse[],
  standing: ReadonlyMap<number, CountStanding>,
): EstimateInput {
  const before = [...standing].flatMap(([unit, { countedBefore }]): [number, number][] =>
    countedBefore === null ? [] : [[unit, countedBefore]],
  );
  return {
    design: declared.design.kind,
    units,
    picks: lists.flatMap((list) => picksAt(list, list.use.inUse)),
    closedPicks: lists.flatMap((list) => picksAt(list, [...list.use.closed, ...list.use.passedOver])),
    counts: new Map([...standing].map(([unit, { entry }]) => [unit, cellCount(entry)])),
    countedBefore: new Map(before),
    countIn: specOf(frame).countIn,
    areaM2: summaryOf(frame).frameAreaM2,
    level: Number(declared.level),
    limits: declared.limits,
  };
}

function picksAt({ entries }: StratumInUse, at: readonly { readonly position: number }[]): DrawnPick[] {
  const wanted = new Set(at.map(({ position }) => position));
  return entries
    .filter((entry) => wanted.has(entry.position))
    .map(({ position, unit, label }) => ({ order: position, unit, label }));
}

/** The entry in force of each unit, from its first count and amendments in the order in which they came. */
function standingCounts(
  reader: Reader,
  seasonId: string,
  frameId: string,
  targetId: string,
): Map<number, CountStanding> {
  const units = new Map(visitsOn(reader, seasonId, frameId).map((visit) => [visit.id, visit.unit]));
  const standing = new Map<number, CountStanding>();
  for (const entry of firstCountsOf(reader, seasonId, targetId)) {
    const unit = units.get(entry.visitId);
    if (unit === undefined) continue;
    const before = standing.get(unit);
    const countedBefore = isClosing(entry.state) && before ? (valueBefore(before.entry) ?? before.countedBefore) : null;
    standing.set(unit, { entry, countedBefore });
  }
  return standing;
}

/** The number that an entry brought into the estimate: 0 for a cell that is not in the population. */
function valueBefore({ state, value }: CountRow): number | null {
  if (!bringsValue(state)) return null;
  return state === "not-in-population" ? 0 : value;
}

/** What an entry says of its cell, as the estimators take it. */
export function cellCount({
  state,
  value,
}: Pick<CountRow, "state" | "value">): Exclude<CellCount, { state: "not-visited" }> {
  if (state !== "counted") return { state };
  if (value === null) throw new Error("a counted cell without a value");
  return { state, value };
}
