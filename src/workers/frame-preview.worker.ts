import { expose, transfer } from "comlink";
import type { CellSpec } from "#shared/frame/cell-spec.ts";
import type { FrameCells } from "#shared/frame/cells.ts";
import { FramePreviewWork, type PlaneReference } from "./frame-preview-work.ts";
import { outcomeOf } from "./outcome.ts";

/** The arrays of a frame's cells go over to the page without being copied. */
function buffersOf(cells: FrameCells): ArrayBuffer[] {
  return [cells.rowStart, cells.first, cells.last, cells.share, cells.unitsBefore].map(
    (array) => array.buffer as ArrayBuffer,
  );
}

const work = new FramePreviewWork();

const worker = {
  loadPlane: (reference: PlaneReference) => outcomeOf(() => work.loadPlane(reference)),

  preview: async (reference: PlaneReference, spec: CellSpec) => {
    const outcome = await outcomeOf(() => work.preview(reference, spec));
    if (!outcome.ok) return outcome;
    const made = Object.values(outcome.value.cells).filter((cells) => cells !== null);
    return transfer(outcome, made.flatMap(buffersOf));
  },

  loadSealed: async (surveyId: string, frameId: string) => {
    const outcome = await outcomeOf(() => work.loadSealed(surveyId, frameId));
    return outcome.ok ? transfer(outcome, buffersOf(outcome.value)) : outcome;
  },
};

export type FramePreviewWorker = typeof worker;

expose(worker);
