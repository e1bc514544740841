import { entriesSha256 } from "#shared/draw/entries-hash.ts";
import { checkSeed, madeHereSeed } from "#shared/draw/seed.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import {
  type DeclarationState,
  insertDraw,
  insertSeasonDraw,
  insertSeed,
  nextDrawNumber,
  type SeedRow,
} from "../db/draws.ts";
import { findFrame } from "../db/frames.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { type PlacedEntry, placeEntries } from "../jobs/place-entries.ts";
import { actingMember } from "./acting-member.ts";
import { newId } from "./new-id.ts";
import { openVisitsFor } from "./open-visits-for.ts";
import { randomBelow } from "./random-below.ts";
import { declaredText, neededDeclaration } from "./read-draws.ts";
import { recordEvent } from "./record-event.ts";

/** Longer lists are drawn in a worker thread. */
const ENTRIES_DRAWN_HERE = 2000;

/**
 * Gives an open declaration its seed, and draws; once a declaration. The seed and its event are on disk before anything
 * is drawn with it, so a draw that is broken off goes on with the same seed. A second click gets the draw that is there.
 */
export async function makeDraw(
  ctx: Context,
  declarationId: string,
  typedSeed: string | undefined,
  signal: AbortSignal,
): Promise<string> {
  const given = writeTx(ctx.db, (tx) => giveSeed(tx, ctx, declarationId, typedSeed));
  if (given.drawId !== null) return given.drawId;
  const entries = await entriesFor(ctx, given, signal);
  return writeTx(ctx.db, (tx) => keepDraw(tx, ctx, declarationId, entries));
}

type Seeded = DeclarationState & { readonly seed: SeedRow };

function giveSeed(tx: Tx, ctx: Context, declarationId: string, typed: string | undefined): Seeded {
  const state = neededDeclaration(tx, declarationId);
  const { seedSource } = declaredText(state);
  expectNotAbandoned(state);
  if (state.seed !== null) {
    if (typed !== undefined && checkSeed(typed) !== state.seed.text) {
      throw new Problem(
        "declaration-closed",
        `Its seed was given at ${state.seed.givenAt}: one declaration has one seed.`,
      );
    }
    return { ...state, seed: state.seed };
  }
  const seed: SeedRow = {
    declarationId,
    text: seedText(ctx, seedSource.kind, typed),
    source: seedSource.kind,
    givenBy: actingMember(ctx),
    givenAt: ctx.now().toISOString(),
  };
  insertSeed(tx, seed);
  recordEvent(tx, ctx, {
    surveyId: ctx.surveyId,
    at: seed.givenAt,
    memberId: seed.givenBy,
    kind: "seed-given",
    payload: { version: 1, declarationId, source: seed.source, seed: seed.text },
  });
  return { ...state, seed };
}

function seedText(ctx: Context, source: "made-here" | "typed", typed: string | undefined): string {
  switch (source) {
    case "made-here":
      if (typed !== undefined) {
        throw new Problem("seed-invalid", "The declaration says that the seed is made here. Leave the seed out.");
      }
      return madeHereSeed((m) => randomBelow(ctx, m));
    case "typed":
      if (typed === undefined)
        throw new Problem("seed-invalid", "The declaration says that the seed is typed. Type it.");
      return checkSeed(typed);
  }
}

function entriesFor(ctx: Context, state: Seeded, signal: AbortSignal): Promise<PlacedEntry[]> | PlacedEntry[] {
  const declared = declaredText(state);
  const frame = findFrame(ctx.db, state.declaration.frameVersionId);
  if (!frame?.cells) throw new Error(`frame ${state.declaration.frameVersionId} is declared and has no cells`);
  const task = {
    frame: { sha256: declared.frameSha256, units: state.units },
    cells: new Uint8Array(frame.cells),
    design: declared.design,
    seed: state.seed.text,
    generator: declared.generator,
    reserves: declared.reserves,
  };
  if (declared.design.n + declared.reserves <= ENTRIES_DRAWN_HERE) return placeEntries(task);
  return ctx.jobs.run("place-entries", task, signal);
}

function keepDraw(tx: Tx, ctx: Context, declarationId: string, entries: readonly PlacedEntry[]): string {
  const state = neededDeclaration(tx, declarationId);
  if (state.drawId !== null) return state.drawId; // somebody else clicked at the same time
  expectNotAbandoned(state);
  const { seasonId, frameVersionId: frameId } = state.declaration;
  const memberId = actingMember(ctx);
  const at = ctx.now().toISOString();
  const drawId = newId(ctx);
  const number = nextDrawNumber(tx, ctx.surveyId);
  insertDraw(
    tx,
    {
      id: drawId,
      surveyId: ctx.surveyId,
      number,
      declarationId,
      frameVersionId: frameId,
      drawnBy: memberId,
      drawnAt: at,
    },
    entries.map((entry) => ({ ...entry, drawId })),
  );
  insertSeasonDraw(tx, { id: newId(ctx), seasonId, drawId, takenAt: at, endedAt: null });
  const picks = entries.filter((entry) => !entry.reserve);
  openVisitsFor(tx, ctx, { seasonId, frameId, at }, picks);
  recordEvent(tx, ctx, {
    surveyId: ctx.surveyId,
    at,
    memberId,
    kind: "draw-made",
    payload: {
      version: 1,
      drawId,
      number,
      declarationId,
      picks: picks.length,
      reserves: entries.length - picks.length,
      entriesSha256: entriesSha256(entries),
    },
  });
  return drawId;
}

function expectNotAbandoned({ abandoned }: DeclarationState): void {
  if (abandoned === null) return;
  throw new Problem("declaration-closed", `It was abandoned at ${abandoned.abandonedAt}. Declare a new draw.`);
}
