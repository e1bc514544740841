import type { FrameVersion } from "#shared/api/frame.ts";
import { type FrameHead, specOf, summaryOf } from "../db/frames.ts";
import type { FrameView } from "../services/read-frames.ts";

export function presentFrame({ frame, crs, draws, names }: FrameView): FrameVersion {
  return {
    id: frame.id,
    number: frame.number,
    state: frame.sealedAt === null ? "draft" : "sealed",
    spec: specOf(frame),
    draftSha256: frame.draftSha256,
    crs,
    sealed: sealOf(frame, names),
    draws,
    createdAt: frame.createdAt,
  };
}

function sealOf(frame: FrameHead, names: ReadonlyMap<string, string>): FrameVersion["sealed"] {
  const { sealedAt, sealedBy, units, listSha256, frameSha256 } = frame;
  if (sealedAt === null || sealedBy === null || units === null || listSha256 === null || frameSha256 === null)
    return null;
  return {
    at: sealedAt,
    by: names.get(sealedBy) ?? "somebody",
    units,
    listSha256,
    frameSha256,
    summary: summaryOf(frame),
  };
}
