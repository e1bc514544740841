import { FARTHEST_MM } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import { WHOLE_CELL, type Billionths } from "#shared/units/metric.ts";

/**
 * A lattice of upright rectangles (rule R2). Cell (column c, row r) covers
 * [originEast + c·width, originEast + (c+1)·width) × [originNorth + r·height, originNorth + (r+1)·height); rows grow to
 * the north. Sizes are even whole millimetres, so that every centre is a whole millimetre too.
 */
export interface RectangleCells {
  readonly shape: "rectangle";
  readonly widthMm: number;
  readonly heightMm: number;
  readonly originEastMm: number;
  readonly originNorthMm: number;
  /** Counter-clockwise from the CRS's east, in millionths of a degree; rectangles that are turned come later. */
  readonly rotationMicroDegrees: 0;
}

export type CellSpec = RectangleCells;

/** Which cells belong to the frame (rule R3); a share is compared after it is rounded to whole billionths. */
export type Membership =
  | { readonly rule: "touch" }
  | { readonly rule: "centre" }
  | { readonly rule: "inside" }
  | { readonly rule: "share"; readonly atLeast: Billionths };

/** Whether a count is of the part of the cell inside the boundary, or of the whole cell. */
export type CountIn = "inside" | "whole";

/** Lattice indices of a cell (rule R2); negative south and west of the origin. */
export interface CellAddress {
  readonly column: number;
  readonly row: number;
}

export interface EdgePreset {
  readonly membership: Membership;
  readonly countIn: CountIn;
}

export const EDGE_PRESET_NAMES = ["clip", "centre", "inside"] as const;
export type EdgePresetName = (typeof EDGE_PRESET_NAMES)[number];

export const EDGE_PRESETS: Readonly<Record<EdgePresetName, EdgePreset>> = {
  clip: { membership: { rule: "touch" }, countIn: "inside" },
  centre: { membership: { rule: "centre" }, countIn: "whole" },
  inside: { membership: { rule: "inside" }, countIn: "whole" },
};

/** A thousand kilometres: no survey's cell is larger, and cell areas stay far below what exact sums can hold. */
export const LARGEST_SIDE_MM = 1_000_000_000;

function checkSide(name: string, value: number): void {
  if (!Number.isInteger(value) || value <= 0 || value % 2 !== 0) {
    throw new Problem(
      "cell-size",
      `The ${name} is ${value} mm. Give an even number of whole millimetres above 0, for example ${Math.max(2, Math.round(value / 2) * 2 || 2)} mm.`,
    );
  }
  if (value > LARGEST_SIDE_MM) {
    throw new Problem("cell-size", `The ${name} is ${value} mm, more than 1,000 km. Give a smaller one.`);
  }
}

/**
 * Gives back the spec with nothing but its own members.
 * @throws Problem `cell-size` on sides that are not even whole millimetres or an origin that is not whole millimetres.
 */
export function checkCellSpec(spec: CellSpec): CellSpec {
  checkSide("cell width", spec.widthMm);
  checkSide("cell height", spec.heightMm);
  for (const origin of [spec.originEastMm, spec.originNorthMm]) {
    if (!Number.isInteger(origin) || Math.abs(origin) > FARTHEST_MM) {
      throw new Problem("cell-size", `The origin is at ${origin} mm. Give whole millimetres.`);
    }
  }
  return {
    shape: "rectangle",
    widthMm: spec.widthMm,
    heightMm: spec.heightMm,
    originEastMm: spec.originEastMm === 0 ? 0 : spec.originEastMm,
    originNorthMm: spec.originNorthMm === 0 ? 0 : spec.originNorthMm,
    rotationMicroDegrees: 0,
  };
}

/**
 * Gives back the membership.
 * @throws Problem `cell-size` on a share that is not 1 … 1,000,000,000 whole billionths.
 */
export function checkMembership(membership: Membership): Membership {
  if (membership.rule !== "share") return { rule: membership.rule };
  const { atLeast } = membership;
  if (!Number.isInteger(atLeast) || atLeast < 1 || atLeast > WHOLE_CELL) {
    throw new Problem(
      "cell-size",
      `The smallest share is ${atLeast} billionths. Give a whole number from 1 to 1,000,000,000.`,
    );
  }
  return { rule: "share", atLeast };
}
