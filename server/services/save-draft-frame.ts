import type { FrameSpec } from "#shared/api/frame.ts";
import { checkCellSpec } from "#shared/frame/cell-spec.ts";
import { Problem } from "#shared/problem.ts";
import { canonicalSha256 } from "#shared/record/chain.ts";
import type { Context } from "../context.ts";
import { findAreaHead, findPlane } from "../db/areas.ts";
import { type FrameHead, findFrameHead, framesOf, insertFrame, updateDraft } from "../db/frames.ts";
import { writeTx } from "../db/open.ts";
import { newId } from "./new-id.ts";

/** Keeps what the planner set: in the draft where there is one, else as the draft of the next version. */
export function saveDraftFrame(ctx: Context, spec: FrameSpec): FrameHead {
  checkCellSpec(spec.cells);
  return writeTx(ctx.db, (tx) => {
    const area = findAreaHead(tx, spec.areaId);
    if (area?.surveyId !== ctx.surveyId) throw new Problem("area-missing", "Import the study area first.");
    const plane = findPlane(tx, spec.areaId, spec.epsg);
    if (!plane) throw new Problem("crs-unknown", "Choose the coordinate reference system again, then the cells.");
    const draftSha256 = canonicalSha256({ spec, ringsSha256: plane.ringsSha256 });
    const newest = framesOf(tx, ctx.surveyId)[0];
    const id = newest?.sealedAt === null ? newest.id : newId(ctx);
    if (newest?.sealedAt === null) {
      updateDraft(tx, id, { areaVersionId: spec.areaId, spec, draftSha256 });
    } else {
      insertFrame(tx, {
        id,
        surveyId: ctx.surveyId,
        number: (newest?.number ?? 0) + 1,
        areaVersionId: spec.areaId,
        kind: "grid",
        spec,
        draftSha256,
        statement: null,
        frameSha256: null,
        listSha256: null,
        units: null,
        cells: null,
        cellsFormat: null,
        summary: null,
        sealedAt: null,
        sealedBy: null,
        createdAt: ctx.now().toISOString(),
      });
    }
    const kept = findFrameHead(tx, id);
    if (!kept) throw new Error(`draft ${id} was not kept`);
    return kept;
  });
}
