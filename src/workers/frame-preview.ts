import { wrap, type Remote } from "comlink";
import type { CellSpec } from "#shared/frame/cell-spec.ts";
import type { FrameCells } from "#shared/frame/cells.ts";
import type { FramePreviewWorker } from "./frame-preview.worker.ts";
import type { FramePreviewResult, LoadedPlane, PlaneReference } from "./frame-preview-work.ts";
import { valueOf } from "./outcome.ts";

let remote: Remote<FramePreviewWorker> | null = null;

/** One worker for the page; it keeps the planes that were loaded. */
function worker(): Remote<FramePreviewWorker> {
  remote ??= wrap<FramePreviewWorker>(
    new Worker(new URL("./frame-preview.worker.ts", import.meta.url), { type: "module", name: "frame preview" }),
  );
  return remote;
}

/** The study area on a plane; made there where it may be and is not yet. @throws Problem as the server gave it. */
export async function loadPlane(reference: PlaneReference): Promise<LoadedPlane> {
  return valueOf(await worker().loadPlane(reference));
}

/** Cells and figures of all three edge presets. @throws Problem `cancelled` when a newer request overtook it; as measureCells. */
export async function previewCells(reference: PlaneReference, spec: CellSpec): Promise<FramePreviewResult> {
  return valueOf(await worker().preview(reference, spec));
}

/** The cells of a sealed frame. */
export async function loadSealedCells(surveyId: string, frameId: string): Promise<FrameCells> {
  return valueOf(await worker().loadSealed(surveyId, frameId));
}
