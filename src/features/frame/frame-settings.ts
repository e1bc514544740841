import type { AreaVersion } from "#shared/api/area.ts";
import type { FrameSpec } from "#shared/api/frame.ts";
import { EDGE_PRESET_NAMES, EDGE_PRESETS, type CellSpec, type EdgePresetName } from "#shared/frame/cell-spec.ts";
import { lengthText, readOrigin, readSide, type LengthReading } from "./read-length.ts";

/** What a planner sets, as typed: a slip stays in its field until it is mended. */
export interface FrameSettings {
  readonly areaId: string;
  /** Null while no projected system is chosen. */
  readonly epsg: number | null;
  readonly side: string;
  readonly originEast: string;
  readonly originNorth: string;
  readonly preset: EdgePresetName;
}

/** The preset that a stored choice is; clip for one that no preset names. */
export function presetOf(spec: Pick<FrameSpec, "membership" | "countIn">): EdgePresetName {
  return (
    EDGE_PRESET_NAMES.find((name) => {
      const preset = EDGE_PRESETS[name];
      return preset.membership.rule === spec.membership.rule && preset.countIn === spec.countIn;
    }) ?? "clip"
  );
}

/** Settings to begin with: those of a stored draft or version, else the suggested system, squares of 20 m, origin 0, 0, clip. */
export function startSettings(area: AreaVersion, from: FrameSpec | null): FrameSettings {
  return {
    areaId: area.id,
    epsg: from?.epsg ?? area.suggestedCrs[0]?.epsg ?? null,
    side: lengthText(from?.cells.widthMm ?? 20_000),
    originEast: lengthText(from?.cells.originEastMm ?? 0),
    originNorth: lengthText(from?.cells.originNorthMm ?? 0),
    preset: from === null ? "clip" : presetOf(from),
  };
}

export interface ReadSettings {
  readonly side: LengthReading;
  readonly originEast: LengthReading;
  readonly originNorth: LengthReading;
  /** The cells, where all of it can be read. */
  readonly cells: CellSpec | null;
}

export function readSettings(settings: FrameSettings): ReadSettings {
  const side = readSide(settings.side);
  const originEast = readOrigin(settings.originEast);
  const originNorth = readOrigin(settings.originNorth);
  const cells: CellSpec | null =
    side.ok && originEast.ok && originNorth.ok
      ? {
          shape: "rectangle",
          widthMm: side.millimetres,
          heightMm: side.millimetres,
          originEastMm: originEast.millimetres,
          originNorthMm: originNorth.millimetres,
          rotationMicroDegrees: 0,
        }
      : null;
  return { side, originEast, originNorth, cells };
}

/** What is kept on the server; null while something cannot be read or is not chosen. */
export function specOf(settings: FrameSettings): FrameSpec | null {
  const { cells } = readSettings(settings);
  const { areaId, epsg, preset } = settings;
  if (cells === null || epsg === null) return null;
  const { membership, countIn } = EDGE_PRESETS[preset];
  return { areaId, epsg, cells, membership, countIn, leftOut: [] };
}
