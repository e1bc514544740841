import type { FrameSpec } from "#shared/api/frame.ts";
import { checkCellSpec } from "#shared/frame/cell-spec.ts";
import { Problem } from "#shared/problem.ts";
import { canonicalSha256 } from "#shared/record/chain.ts";
import type { Context, Platform } from "../context.ts";
import { findAreaHead, findPlane } from "../db/areas.ts";
import { type FrameHead, findFrameHead, framesOf, insertFrame, specOf, updateDraft } from "../db/frames.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { newId } from "./new-id.ts";

/**
 * Keeps what the planner set: in the draft where there is one, else as the draft of the next version. `seen` is the hash of
 * the draft that the planner began with, or null where there was none.
 * @throws Problem `changed-meanwhile` with the draft that is kept now, or null where it was sealed
 */
export function saveDraftFrame(ctx: Context, spec: FrameSpec, seen: string | null): FrameHead {
  checkCellSpec(spec.cells);
  return writeTx(ctx.db, (tx) => {
    const area = findAreaHead(tx, spec.areaId);
    if (area?.surveyId !== ctx.surveyId) throw new Problem("area-missing", "Import the study area first.");
    const newest = framesOf(tx, ctx.surveyId)[0];
    const draft = newest?.sealedAt === null ? newest : undefined;
    const draftSha256 = draftHash(tx, spec);
    if (draftSha256 === null) {
      throw new Problem("crs-unknown", "Choose the coordinate reference system again, then the cells.");
    }
    if (draft?.draftSha256 === draftSha256) return draft;
    if ((draft?.draftSha256 ?? null) !== seen) throw changedMeanwhile(draft, newest);
    const kept = keepDraft(tx, ctx, ctx.surveyId, spec);
    if (!kept) throw new Error("a draft with a plane was not kept");
    return kept;
  });
}

function changedMeanwhile(draft: FrameHead | undefined, newest: FrameHead | undefined): Problem {
  const current = draft === undefined ? null : { spec: specOf(draft), draftSha256: draft.draftSha256 };
  const what =
    draft === undefined
      ? `The draft was sealed as version ${newest?.number ?? 1}. What is set here would begin the next version.`
      : "Look at both versions, then say what is to stand.";
  return new Problem("changed-meanwhile", what, { kind: "versions", current });
}

function draftHash(tx: Tx, spec: FrameSpec): string | null {
  const plane = findPlane(tx, spec.areaId, spec.epsg);
  return plane ? canonicalSha256({ spec, ringsSha256: plane.ringsSha256 }) : null;
}

/** Writes settings into the draft of a survey, or begins one; null where the area has no plane in that system. */
export function keepDraft(
  tx: Tx,
  platform: Pick<Platform, "random" | "now">,
  surveyId: string,
  spec: FrameSpec,
): FrameHead | null {
  const draftSha256 = draftHash(tx, spec);
  if (draftSha256 === null) return null;
  const newest = framesOf(tx, surveyId)[0];
  const id = newest?.sealedAt === null ? newest.id : newId(platform);
  if (newest?.sealedAt === null) {
    updateDraft(tx, id, { areaVersionId: spec.areaId, spec, draftSha256 });
  } else {
    insertFrame(tx, {
      id,
      surveyId,
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
      createdAt: platform.now().toISOString(),
    });
  }
  const kept = findFrameHead(tx, id);
  if (!kept) throw new Error(`draft ${id} was not kept`);
  return kept;
}
