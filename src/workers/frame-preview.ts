import { wrap, type Remote } from "comlink";
import type { CellSpec } from "#shared/frame/cell-spec.ts";
import type { FrameCells } from "#shared/frame/cells.ts";
import { Problem } from "#shared/problem.ts";
import type { FramePreviewWorker } from "./frame-preview.worker.ts";
import type { FramePreviewResult, LoadedPlane, PlaneReference } from "./frame-preview-work.ts";
import { type Outcome, valueOf } from "./outcome.ts";

interface Running {
  readonly remote: Remote<FramePreviewWorker>;
  /** Never settles but when the worker breaks: its code could not be fetched, or it ran out of memory. */
  readonly broken: Promise<never>;
}

let running: Running | null = null;

/** One worker for the page, which keeps the planes that were loaded; a new one after one that broke. */
function start(): Running {
  const worker = new Worker(new URL("./frame-preview.worker.ts", import.meta.url), {
    type: "module",
    name: "frame preview",
  });
  const broken = new Promise<never>((_, reject) => {
    worker.addEventListener("error", () => {
      running = null;
      worker.terminate();
      reject(new Problem("unreachable", "The part of Quillet that measures cells did not start. Reload the page."));
    });
  });
  broken.catch(() => undefined); // told to whoever waits at that moment
  return { remote: wrap<FramePreviewWorker>(worker), broken };
}

/** Asks the worker; without a race a call to a worker that broke would wait for ever. */
async function ask<T>(question: (remote: Remote<FramePreviewWorker>) => Promise<Outcome<T>>): Promise<T> {
  running ??= start();
  return valueOf(await Promise.race([question(running.remote), running.broken]));
}

/** The study area on a plane; made there where it may be and is not yet. @throws Problem as the server gave it. */
export function loadPlane(reference: PlaneReference): Promise<LoadedPlane> {
  return ask((remote) => remote.loadPlane(reference));
}

/** Cells and figures of all three edge presets. @throws Problem `cancelled` when a newer request overtook it; as measureCells. */
export function previewCells(reference: PlaneReference, spec: CellSpec): Promise<FramePreviewResult> {
  return ask((remote) => remote.preview(reference, spec));
}

/** The cells of a sealed frame. */
export function loadSealedCells(surveyId: string, frameId: string): Promise<FrameCells> {
  return ask((remote) => remote.loadSealed(surveyId, frameId));
}
