import type { PlaneArea } from "#shared/geometry/rings.ts";
import { EDGE_PRESETS, type CellSpec, type EdgePresetName } from "./cell-spec.ts";
import type { FrameSummary, MeasuredCells } from "./cells.ts";
import { measureCells } from "./measure.ts";
import { summarise } from "./summary.ts";
import type { Progress } from "./walk.ts";

export interface FramePreview {
  readonly presets: Readonly<Record<EdgePresetName, FrameSummary>>;
  readonly measured: MeasuredCells;
}

/**
 * What each edge preset would give, from one measurement; `cells` may be more than a frame may hold, or 0.
 * @throws as `measureCells`.
 */
export function previewFrame(area: PlaneArea, spec: CellSpec, onProgress?: Progress): FramePreview {
  const measured = measureCells(area, spec, onProgress);
  const preset = (name: EdgePresetName): FrameSummary => {
    const { membership, countIn } = EDGE_PRESETS[name];
    return summarise(measured, membership, countIn);
  };
  return { presets: { clip: preset("clip"), centre: preset("centre"), inside: preset("inside") }, measured };
}
