import * as api from "#shared/api/frame.ts";
import type { Mount } from "../http/mount.ts";
import { presentFrame } from "../presenters/frame.ts";
import { readFrameCells, readFrameList, readFrameStatement } from "../services/read-frame-files.ts";
import { listFrames, viewOfFrame } from "../services/read-frames.ts";
import { saveDraftFrame } from "../services/save-draft-frame.ts";
import { sealFrame } from "../services/seal-frame.ts";

export function frameRoutes(mount: Mount): void {
  mount.survey(api.listFrames, (ctx) => ({ frames: listFrames(ctx).map(presentFrame) }));

  mount.survey(api.saveDraftFrame, (ctx, { body }) =>
    presentFrame(viewOfFrame(ctx, saveDraftFrame(ctx, body.spec, body.seen))),
  );

  mount.survey(api.sealFrame, async (ctx, { params, body, signal }) =>
    presentFrame(viewOfFrame(ctx, await sealFrame(ctx, params.frameId, body, signal))),
  );

  mount.survey(api.readFrameStatement, (ctx, { params }) => {
    const { name, text } = readFrameStatement(ctx, params.frameId);
    return { type: "application/json", fileName: `${name}.json`, body: text };
  });

  mount.survey(api.readFrameList, (ctx, { params }) => {
    const { name, pieces } = readFrameList(ctx, params.frameId);
    return { type: "text/plain", fileName: `${name}-list.txt`, body: pieces };
  });

  mount.survey(api.readFrameCells, (ctx, { params }) => ({
    type: "application/octet-stream",
    immutable: true,
    body: readFrameCells(ctx, params.frameId),
  }));
}
