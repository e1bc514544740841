import type { Context } from "../context.ts";
import { areaGeometry, findPlane, keepPlane, type PlaneRow } from "../db/areas.ts";
import { writeTx } from "../db/open.ts";

/**
 * The study area on a projected plane: whole-millimetre rings, made once in a worker and kept (rule R1). Later calls and
 * browsers only read them, so that nothing that is hashed is ever projected twice.
 */
export async function makePlane(ctx: Context, areaId: string, epsg: number, signal: AbortSignal): Promise<PlaneRow> {
  const known = findPlane(ctx.db, areaId, epsg);
  if (known) return known;
  const geometry = areaGeometry(ctx.db, areaId);
  if (geometry === undefined) throw new Error(`area ${areaId} has no geometry`);
  const made = await ctx.jobs.run("make-plane", { geometry, epsg }, signal);
  return writeTx(ctx.db, (tx) => {
    keepPlane(tx, { areaVersionId: areaId, epsg, ...made, createdAt: ctx.now().toISOString() });
    const kept = findPlane(tx, areaId, epsg);
    if (!kept) throw new Error(`the plane EPSG:${epsg} of area ${areaId} was not kept`);
    return kept;
  });
}
