import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { type AreaHead, areaFile, areasOf, findPlane, type PlaneRow } from "../db/areas.ts";
import { memberNames } from "../db/members.ts";

export function listAreas(ctx: Context): { areas: AreaHead[]; names: Map<string, string> } {
  return { areas: areasOf(ctx.db, ctx.surveyId), names: memberNames(ctx.db, ctx.surveyId) };
}

/** The boundary file as it came. */
export function readAreaFile(ctx: Context, areaId: string): { name: string; bytes: Buffer } {
  const file = areaFile(ctx.db, areaId);
  if (!file) throw new Error(`area ${areaId} has no file`);
  return file;
}

export function readPlane(ctx: Context, areaId: string, epsg: number): PlaneRow {
  const plane = findPlane(ctx.db, areaId, epsg);
  if (!plane) throw new Problem("not-found", "A planner has not used this coordinate reference system yet.");
  return plane;
}
