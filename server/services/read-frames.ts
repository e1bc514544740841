import type { FrameVersion } from "#shared/api/frame.ts";
import type { Context } from "../context.ts";
import { findPlane } from "../db/areas.ts";
import { drawsOnFrame } from "../db/draws.ts";
import { type FrameHead, framesOf, specOf } from "../db/frames.ts";
import { memberNames } from "../db/members.ts";

export interface FrameView {
  readonly frame: FrameHead;
  readonly crs: FrameVersion["crs"];
  readonly draws: number;
  readonly names: ReadonlyMap<string, string>;
}

export function listFrames(ctx: Context): FrameView[] {
  const names = memberNames(ctx.db, ctx.surveyId);
  return framesOf(ctx.db, ctx.surveyId).map((frame) => viewOfFrame(ctx, frame, names));
}

export function viewOfFrame(ctx: Context, frame: FrameHead, names = memberNames(ctx.db, ctx.surveyId)): FrameView {
  const { epsg } = specOf(frame);
  const plane = findPlane(ctx.db, frame.areaVersionId, epsg);
  if (!plane) throw new Error(`frame ${frame.id} has no plane EPSG:${epsg}`);
  const crs = { text: plane.crsText, epsg, name: plane.crsName };
  return { frame, crs, draws: drawsOnFrame(ctx.db, frame.id), names };
}
