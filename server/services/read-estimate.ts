import { countsInForce, type CountStanding } from "#shared/counts/in-force.ts";
import { estimateOfDraw } from "#shared/estimate/from-draw.ts";
import type { EstimateResult } from "#shared/estimate/result.ts";
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
  /** By unit. */
  readonly standing: Standing;
  readonly chosenAfterCounts: readonly ("limits" | "level")[];
  readonly firstCountAt: string | null;
  readonly newest: EventRow;
}

type Standing = ReadonlyMap<number, CountStanding<CountRow>>;

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
  const result = estimateOfDraw({
    design: declared.design.kind,
    units: state.units,
    lists,
    standing,
    countIn: specOf(frame).countIn,
    areaM2: summaryOf(frame).frameAreaM2,
    level: declared.level,
    limits: declared.limits,
  });
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

/** How each cell stands, from its first count and amendments in the order in which they came. */
function standingCounts(reader: Reader, seasonId: string, frameId: string, targetId: string): Standing {
  const units = new Map(visitsOn(reader, seasonId, frameId).map((visit) => [visit.id, visit.unit]));
  return countsInForce(
    firstCountsOf(reader, seasonId, targetId).flatMap((entry): [number, CountRow][] => {
      const unit = units.get(entry.visitId);
      return unit === undefined ? [] : [[unit, entry]];
    }),
  );
}
