import { useState } from "react";
import type { AreaVersion } from "#shared/api/area.ts";
import type { CellAddress } from "#shared/frame/cell-spec.ts";
import { MOST_UNITS } from "#shared/frame/cells.ts";
import { problemOf } from "../../api/problem-of.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { formatMillimetres } from "../../components/ui/format.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { CellSizeFields } from "./CellSizeFields.tsx";
import { CrsField } from "./CrsField.tsx";
import { EdgeRules } from "./EdgeRules.tsx";
import { FindCell } from "./FindCell.tsx";
import { FrameAreas } from "./FrameAreas.tsx";
import { scaleText, speaksFor, tooManyText } from "./frame-words.ts";
import type { FrameEditorState } from "./use-frame-editor.ts";

interface FrameSettingsPanelProps {
  readonly editor: FrameEditorState;
  readonly area: AreaVersion;
  readonly plural: string;
  readonly chosen: CellAddress | null;
  readonly onChoose: (cell: CellAddress | null) => void;
}

function crsHelp(editor: FrameEditorState, area: AreaVersion): string {
  const { plane, planeIsThere, settings } = editor;
  if (plane.data === undefined || !planeIsThere) return "Laying the area on its plane…";
  const scale = scaleText(plane.data.planeAreaM2, plane.data.geodesicAreaM2);
  const suggested = area.suggestedCrs[0]?.epsg === settings.epsg;
  return suggested ? `Suggested here: ${scale}.` : `Here ${scale}.`;
}

/** What is wrong with the size, told at its field: too many cells, or none. */
function sizeError({ preview, settings, read }: FrameEditorState): string | null {
  if (!read.side.ok) return null;
  if (preview.isError) {
    const problem = problemOf(preview.error);
    return problem.code === "frame-too-large" || problem.code === "cell-size" ? problem.message : null;
  }
  if (preview.data === undefined || preview.isPlaceholderData) return null;
  const { cells } = preview.data.summaries[settings.preset];
  if (cells > MOST_UNITS) return tooManyText(read.side.millimetres, cells);
  return preview.data.refusals[settings.preset]?.detail ?? null;
}

/** Everything that a planner sets for a frame, and what it comes to. */
export function FrameSettingsPanel({ editor, area, plural, chosen, onChoose }: FrameSettingsPanelProps) {
  const [open, setOpen] = useState(false);
  const { settings, change, read, plane, preview } = editor;
  const summary = preview.data?.summaries[settings.preset];
  const cells = preview.data?.cells[settings.preset] ?? null;
  const side = read.side.ok ? formatMillimetres(read.side.millimetres) : `“${settings.side}”`;
  return (
    <>
      <div className="q-frame-brief">
        <h2>Squares of {side}, edge rule</h2>
        <button type="button" className="q-text-button" aria-expanded={open} onClick={() => setOpen(!open)}>
          {open ? "Done" : "Change"}
        </button>
      </div>
      <div
        className="q-frame-settings"
        data-open={open || !read.side.ok || sizeError(editor) !== null || plane.isError}
      >
        <CrsField
          suggested={area.suggestedCrs}
          epsg={settings.epsg}
          name={editor.planeIsThere ? (plane.data?.crs.name ?? null) : null}
          help={crsHelp(editor, area)}
          error={plane.isError ? problemOf(plane.error).message : null}
          onChange={(epsg) => change({ epsg })}
        />
        <CellSizeFields settings={settings} read={read} sideError={sizeError(editor)} onChange={change} />
      </div>
      <EdgeRules
        value={settings.preset}
        onChange={(preset) => change({ preset })}
        summaries={preview.data?.summaries ?? null}
      />
      {preview.isError && sizeError(editor) === null && problemOf(preview.error).code !== "cancelled" && (
        <Refusal error={preview.error} />
      )}
      {summary === undefined ? (
        !preview.isError && read.cells !== null && <RuledLoading label="Laying out the cells" />
      ) : (
        <div className="mt-3" aria-busy={preview.isPlaceholderData || undefined}>
          <FrameAreas preset={settings.preset} summary={summary} />
          <p className="q-speak">{speaksFor(settings.preset, summary, plural, plane.data?.holes ?? 0)}</p>
          {summary.cells === 1 && (
            <Banner tone="ochre" title="This makes a single cell.">
              There is nothing to draw from: use smaller squares.
            </Banner>
          )}
        </div>
      )}
      {cells !== null && <FindCell cells={cells} chosen={chosen} onChoose={onChoose} />}
    </>
  );
}
