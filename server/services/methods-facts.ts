import { type MethodsFacts, methodsStatement } from "#shared/estimate/methods-statement.ts";
import type { Context } from "../context.ts";
import { findPlane } from "../db/areas.ts";
import { declarationsOf, drawsOf } from "../db/draws.ts";
import { specOf, summaryOf } from "../db/frames.ts";
import { findSurvey } from "../db/surveys.ts";
import { WHOLE_CELL } from "#shared/units/metric.ts";
import { localDay } from "./local-day.ts";
import type { EstimateView } from "./read-estimate.ts";

const MILLIMETRES_PER_METRE = 1000;

/** Where the frame lies and how large its cells are, in metres. */
export function frameMeasures(ctx: Context, { frame }: EstimateView) {
  const { epsg, cells } = specOf(frame);
  const plane = findPlane(ctx.db, frame.areaVersionId, epsg);
  if (!plane) throw new Error(`frame ${frame.id} has no plane EPSG:${epsg}`);
  return {
    epsg,
    crsName: plane.crsName,
    cellWidthM: cells.widthMm / MILLIMETRES_PER_METRE,
    cellHeightM: cells.heightMm / MILLIMETRES_PER_METRE,
  };
}

/** The methods statement of an estimate, in Markdown, from what stands in the record; days are those of the people there. */
export function methodsOf(ctx: Context, view: EstimateView): string {
  const { result, season, target, frame, draw, declaration } = view;
  const { declared, state } = declaration;
  if (state.seed === null) throw new Error(`draw ${draw.draw.id} has no seed`);
  if (frame.frameSha256 === null || frame.sealedAt === null) throw new Error(`frame ${frame.id} is not sealed`);
  const spec = specOf(frame);
  const summary = summaryOf(frame);
  const share = spec.membership.rule === "share" ? { atLeastShare: spec.membership.atLeast / WHOLE_CELL } : {};
  const source = declared.seedSource.kind;
  const seedSource =
    source === "made-here"
      ? { kind: source }
      : { kind: source, by: declaration.names.get(state.seed.givenBy) ?? "somebody" };
  const survey = findSurvey(ctx.db, ctx.surveyId);
  const day = (at: string): string => localDay(at, survey?.timeZone ?? "UTC");
  const facts: MethodsFacts = {
    survey: survey?.name ?? "",
    season: season.name,
    target: { objects: target.plural },
    countingRule: target.countingRule,
    frame: {
      version: frame.number,
      ...frameMeasures(ctx, view),
      membership: spec.membership.rule,
      ...share,
      areaM2: summary.areaM2,
      uncoveredM2: summary.uncoveredM2,
      cellsLeftOut: spec.leftOut.length,
      sha256: frame.frameSha256,
      sealedAt: day(frame.sealedAt),
    },
    draw: {
      number: draw.draw.number,
      picks: declared.design.n,
      reserves: declared.reserves,
      added: addedTo(view),
      generator: declared.generator,
      seed: state.seed.text,
      seedSource,
      declaredAt: day(state.declaration.declaredAt),
      drawnAt: day(draw.draw.drawnAt),
      ...othersOnRecord(ctx, season.id),
    },
    limitsDeclared: view.chosenAfterCounts.length === 0,
    counted: countedWhen(view, day),
    software: { name: "Quillet", version: ctx.version },
  };
  return methodsStatement(facts, result);
}

/** Entries beyond those that were declared. */
function addedTo({ lists, declaration }: EstimateView): number {
  const { reserves } = declaration.declared;
  return lists.reduce((sum, { entries, picks }) => sum + entries.length - picks - reserves, 0);
}

/** Draws and declarations of the season that ended without being used. */
function othersOnRecord(ctx: Context, seasonId: string): { withdrawn: number; abandoned: number } {
  const declarations = declarationsOf(ctx.db, ctx.surveyId).filter((one) => one.declaration.seasonId === seasonId);
  const ids = new Set(declarations.map((one) => one.declaration.id));
  const draws = drawsOf(ctx.db, ctx.surveyId).filter((one) => ids.has(one.draw.declarationId));
  return {
    withdrawn: draws.filter((one) => one.withdrawn !== null).length,
    abandoned: declarations.filter((one) => one.abandoned !== null).length,
  };
}

function countedWhen({ standing }: EstimateView, day: (at: string) => string): MethodsFacts["counted"] {
  const entries = [...standing.values()].map(({ inForce }) => inForce).filter((entry) => entry.state === "counted");
  const days = entries.map((entry) => day(entry.madeAt)).toSorted();
  return {
    from: days.at(0) ?? "",
    to: days.at(-1) ?? "",
    observers: new Set(entries.map((entry) => entry.observerId)).size,
  };
}
