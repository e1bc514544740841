import type { EdgePresetName } from "#shared/frame/cell-spec.ts";
import { MOST_UNITS } from "#shared/frame/cells.ts";
import type { FrameSummary } from "#shared/api/frame.ts";
import { formatArea, formatMillimetres, formatNumber, formatPercent } from "../../components/ui/format.ts";

export const PRESET_TITLES: Readonly<Record<EdgePresetName, string>> = {
  clip: "Clip",
  centre: "Centre",
  inside: "Inside",
};

export const PRESET_TEXTS: Readonly<Record<EdgePresetName, string>> = {
  clip: "Every cell that touches. Count only inside the boundary.",
  centre: "Cells with their centre in. Count the whole cell.",
  inside: "Only cells wholly in. Count the whole cell.",
};

/** What the estimate will speak for, in one sentence. Areas in square metres of the plane. */
export function speaksFor(preset: EdgePresetName, summary: FrameSummary, plural: string, holes: number): string {
  const whole = formatArea(summary.areaM2);
  const left = holes === 0 ? "" : holes === 1 ? ", the hole left out" : `, its ${formatNumber(holes)} holes left out`;
  switch (preset) {
    case "clip":
      return `The estimate will speak for all ${whole} of the study area: all ${plural} inside the boundary${left}.`;
    case "centre":
      return (
        `The estimate will speak for ${formatArea(summary.frameAreaM2)} of whole cells: ` +
        `${formatArea(summary.outsideM2)} of them lie outside the study area, and ${formatArea(summary.uncoveredM2)} of it is in no cell.`
      );
    case "inside":
      return (
        `The estimate will speak for ${formatArea(summary.frameAreaM2)} of the ${whole}: ` +
        `the ${formatArea(summary.uncoveredM2)} along the edge are in no cell, and nothing will be said of them.`
      );
  }
}

/** How far areas on the plane are from those on the ellipsoid: "areas come out 0.07 % small". */
export function scaleText(planeAreaM2: number, geodesicAreaM2: number): string {
  if (!(geodesicAreaM2 > 0)) return "areas cannot be compared";
  const off = planeAreaM2 / geodesicAreaM2 - 1;
  if (Math.abs(off) < 0.00005) return "areas come out true to 0.01 %".replace(" %", "\u00a0%");
  return `areas come out ${formatPercent(Math.abs(off), 2)} ${off > 0 ? "large" : "small"}`;
}

/** A side that keeps a frame below its limit: grown by the square root of what is too much, rounded up to two figures. */
export function sideThatFits(sideMm: number, cells: number): number {
  const needed = sideMm * Math.sqrt(cells / MOST_UNITS);
  const step = Math.max(2, 10 ** (Math.floor(Math.log10(needed)) - 1));
  return Math.ceil(Math.ceil(needed / step) * step);
}

/** The refusal beside the field when a size makes too many cells. */
export function tooManyText(sideMm: number, cells: number): string {
  return (
    `This makes ${formatNumber(cells)} cells; a frame holds ${formatNumber(MOST_UNITS)}. ` +
    `Use ${formatMillimetres(sideThatFits(sideMm, cells))} or more.`
  );
}
