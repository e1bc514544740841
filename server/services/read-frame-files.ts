import { listPieces } from "#shared/frame/list.ts";
import { unpackCells } from "#shared/frame/pack.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { findFrame, type FrameRow } from "../db/frames.ts";
import { findSurvey } from "../db/surveys.ts";

/** The statement as it was hashed. */
export function readFrameStatement(ctx: Context, frameId: string): { name: string; text: string } {
  const frame = sealedFrame(ctx, frameId);
  return { name: nameOf(ctx, frame), text: frame.statement };
}

/** The list of units as it was hashed, piece by piece. */
export function readFrameList(ctx: Context, frameId: string): { name: string; pieces: Iterable<Uint8Array> } {
  const frame = sealedFrame(ctx, frameId);
  return { name: nameOf(ctx, frame), pieces: listPieces(unpackCells(frame.cells)) };
}

/** The packed cells, with their format version in the first byte. */
export function readFrameCells(ctx: Context, frameId: string): Uint8Array {
  return sealedFrame(ctx, frameId).cells;
}

type SealedFrame = FrameRow & { statement: string; cells: Buffer };

function sealedFrame(ctx: Context, frameId: string): SealedFrame {
  const frame = findFrame(ctx.db, frameId);
  if (!frame?.statement || !frame.cells)
    throw new Problem("frame-not-sealed", "A planner seals it on the Frame stage.");
  return { ...frame, statement: frame.statement, cells: frame.cells };
}

function nameOf(ctx: Context, frame: FrameRow): string {
  const survey = findSurvey(ctx.db, ctx.surveyId)?.name ?? "survey";
  return `${survey.replace(/[^\p{L}\p{N}]+/gu, "-")}-frame-${frame.number}`.toLowerCase();
}
