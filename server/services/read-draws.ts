import { Problem } from "#shared/problem.ts";
import type { DrawRecipe } from "#shared/draw/recipe.ts";
import { drawRecipe } from "#shared/draw/recipe.ts";
import { declaration, type Declaration } from "#shared/draw/declaration.ts";
import type { Context } from "../context.ts";
import { type CountRow, entriesInForce } from "../db/counts.ts";
import {
  declarationsOf,
  type DeclarationState,
  drawsOf,
  type DrawState,
  entriesOf,
  findDeclaration,
  findDraw,
  liveDraw,
  seasonOfDraw,
} from "../db/draws.ts";
import { memberNames } from "../db/members.ts";
import type { Reader } from "../db/open.ts";
import { currentSeason } from "../db/surveys.ts";
import { visitsOn } from "../db/visits.ts";
import { drawInUse, type StratumInUse } from "./draw-in-use.ts";
import { firstTarget } from "./first-target.ts";
import { type RedrawReason, redrawReason } from "./redraw-reason.ts";
import { ownCells, type OwnCells } from "./own-cells.ts";

export interface DeclarationView {
  readonly state: DeclarationState;
  readonly declared: Declaration;
  readonly names: ReadonlyMap<string, string>;
  /** Whether the reader may see the seed: with the frame it tells every cell of the draw, also those of others. */
  readonly seedShown: boolean;
}

export interface DrawSummaryView {
  readonly state: DrawState;
  readonly lists: readonly StratumInUse[];
  readonly names: ReadonlyMap<string, string>;
}

export interface DrawView extends DrawSummaryView {
  readonly declaration: DeclarationView;
  /** By unit. */
  readonly visits: ReadonlyMap<number, { readonly id: string }>;
  /** The counts in force for the first target, by visit. */
  readonly counts: ReadonlyMap<string, CountRow>;
  readonly own: OwnCells;
}

export interface DrawsView {
  readonly declarations: readonly DeclarationView[];
  readonly draws: readonly DrawSummaryView[];
  readonly liveDrawId: string | null;
  readonly reasonNeeded: RedrawReason | null;
}

/** Who sees only their own cells does not get the seed: it and the frame would tell all the others. */
export const seedShown = (ctx: Pick<Context, "reach">): boolean => ctx.reach === "all";

/** The declaration as it was hashed. */
export function declaredText(state: DeclarationState): Declaration {
  return declaration.parse(JSON.parse(state.declaration.text));
}

/** Every declaration and draw ever made in this survey, newest first. */
export function listDraws(ctx: Context): DrawsView {
  const names = memberNames(ctx.db, ctx.surveyId);
  return {
    declarations: declarationsOf(ctx.db, ctx.surveyId).map((state) => ({
      state,
      declared: declaredText(state),
      names,
      seedShown: seedShown(ctx),
    })),
    draws: drawsOf(ctx.db, ctx.surveyId).map((state) => ({
      state,
      lists: drawInUse(ctx.db, state.draw.id, seasonOfDraw(ctx.db, state.draw.id)),
      names,
    })),
    liveDrawId: liveDraw(ctx.db, currentSeason(ctx.db, ctx.surveyId).id)?.draw.id ?? null,
    reasonNeeded: redrawReason(ctx.db, ctx.surveyId, ctx.now()),
  };
}

export function readDeclaration(ctx: Context, declarationId: string): DeclarationView {
  const state = neededDeclaration(ctx.db, declarationId);
  const names = memberNames(ctx.db, ctx.surveyId);
  return { state, declared: declaredText(state), names, seedShown: seedShown(ctx) };
}

/** One draw with its entries as they stand now, and the counts of its cells. */
export function readDraw(ctx: Context, drawId: string): DrawView {
  const state = neededDraw(ctx.db, drawId);
  const seasonId = seasonOfDraw(ctx.db, drawId);
  const names = memberNames(ctx.db, ctx.surveyId);
  const declared = neededDeclaration(ctx.db, state.draw.declarationId);
  const visits = visitsOn(ctx.db, seasonId, state.draw.frameVersionId);
  return {
    state,
    names,
    declaration: { state: declared, declared: declaredText(declared), names, seedShown: seedShown(ctx) },
    lists: drawInUse(ctx.db, drawId, seasonId),
    visits: new Map(visits.map((visit) => [visit.unit, visit])),
    counts: entriesInForce(ctx.db, seasonId, firstTarget(ctx.db, ctx.surveyId).id),
    own: ownCells(ctx, ctx.db),
  };
}

/** How to repeat a draw with tools that are not ours. */
export function readRecipe(ctx: Context, drawId: string): DrawRecipe {
  const { draw } = neededDraw(ctx.db, drawId);
  const state = neededDeclaration(ctx.db, draw.declarationId);
  const { frameSha256, design, generator } = declaredText(state);
  if (state.seed === null) throw new Error(`draw ${drawId} has no seed`);
  const reserves = entriesOf(ctx.db, drawId).length - design.n;
  return drawRecipe({ frameSha256, units: state.units, design, seed: state.seed.text, generator, reserves });
}

export function neededDeclaration(reader: Reader, declarationId: string): DeclarationState {
  const state = findDeclaration(reader, declarationId);
  if (!state) throw new Problem("declaration-missing", "Reload the page: this declaration is not there.");
  return state;
}

export function neededDraw(reader: Reader, drawId: string): DrawState {
  const state = findDraw(reader, drawId);
  if (!state) throw new Problem("draw-missing", "Reload the page: this draw is not there.");
  return state;
}
