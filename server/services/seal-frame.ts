import type { ImportReport } from "#shared/area/report.ts";
import { CELLS_FORMAT } from "#shared/frame/pack.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { findAreaHead, findPlane } from "../db/areas.ts";
import { type FrameHead, findFrameHead, markSealed, specOf } from "../db/frames.ts";
import { writeTx } from "../db/open.ts";
import { actingMember } from "./acting-member.ts";
import { recordEvent } from "./record-event.ts";

/** What the planner saw when they pressed: anything else is not sealed. */
interface Seen {
  readonly draftSha256: string;
  readonly cells: number;
}

/**
 * Freezes a frame for ever: the list and the statement are made in a worker, and written with their hashes and the event
 * in one transaction. From here on every draw quotes the frame's hash.
 */
export async function sealFrame(ctx: Context, frameId: string, seen: Seen, signal: AbortSignal): Promise<FrameHead> {
  const memberId = actingMember(ctx);
  const draft = asSeen(findFrameHead(ctx.db, frameId), seen);
  const spec = specOf(draft);
  const area = findAreaHead(ctx.db, draft.areaVersionId);
  const plane = findPlane(ctx.db, draft.areaVersionId, spec.epsg);
  if (!area || !plane) throw new Error(`draft ${frameId} has no area or no plane`);
  const report = area.report as ImportReport;
  const made = await ctx.jobs.run(
    "seal-frame",
    {
      rings: plane.rings,
      spec,
      crs: { text: plane.crsText, epsg: plane.epsg },
      source: { sha256: area.fileSha256, crs: report.crs.text },
      mending: report.mended,
      salt: Buffer.from(ctx.random(16)).toString("hex"),
    },
    signal,
  );
  if (made.units !== seen.cells) throw changed(`it holds ${made.units} cells now, not ${seen.cells}`);

  return writeTx(ctx.db, (tx) => {
    asSeen(findFrameHead(tx, frameId), seen);
    const at = ctx.now().toISOString();
    const sealed = markSealed(tx, frameId, {
      statement: made.statement,
      frameSha256: made.frameSha256,
      listSha256: made.listSha256,
      units: made.units,
      cells: Buffer.from(made.cells),
      cellsFormat: CELLS_FORMAT,
      summary: made.summary,
      sealedAt: at,
      sealedBy: memberId,
    });
    if (!sealed) throw new Error(`frame ${frameId} was sealed inside our own write lock`);
    recordEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId,
      kind: "frame-sealed",
      payload: {
        version: 1,
        frameId,
        number: draft.number,
        areaId: draft.areaVersionId,
        frameSha256: made.frameSha256,
        listSha256: made.listSha256,
        units: made.units,
      },
    });
    const kept = findFrameHead(tx, frameId);
    if (!kept) throw new Error(`frame ${frameId} was not kept`);
    return kept;
  });
}

function asSeen(frame: FrameHead | undefined, seen: Seen): FrameHead {
  if (!frame) throw new Problem("not-found", "Reload the page: this frame is not there any more.");
  if (frame.sealedAt !== null) {
    throw new Problem("frame-already-sealed", `It was sealed at ${frame.sealedAt}. Reload the page to see it.`);
  }
  if (frame.draftSha256 !== seen.draftSha256) throw changed("its settings are others now");
  return frame;
}

function changed(how: string): Problem {
  return new Problem(
    "frame-changed",
    `It was not sealed: ${how}. Reload, check the cells again, and seal what you see.`,
  );
}
