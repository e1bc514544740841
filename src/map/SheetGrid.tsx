import type { LngLatOf } from "./planes.ts";
import { gridLines, sheetGraticule, stepOf } from "./sheet-lines.ts";
import type { SheetWindow } from "./use-planar-map.ts";

interface SheetGridProps {
  readonly window: SheetWindow;
  readonly inMetres: boolean;
  readonly lngLatOf: LngLatOf | undefined;
}

/** The lines of the CRS's own grid across the sheet; of the graticule where there is no CRS. */
export function SheetGrid({ window, inMetres, lngLatOf }: SheetGridProps) {
  const { west, east, south, north, scale } = window;
  let verticals: number[] = [];
  let horizontals: number[] = [];
  if (inMetres) {
    const step = stepOf(window);
    verticals = gridLines(west, east, step, "", 0).map((line) => line.value);
    horizontals = gridLines(south, north, step, "", 0).map((line) => line.value);
  } else if (lngLatOf !== undefined) {
    const graticule = sheetGraticule(window, lngLatOf);
    verticals = graticule.lower.map((tick) => tick.at);
    horizontals = graticule.right.map((tick) => tick.at);
  }
  const height = (north - south) * scale;
  const width = (east - west) * scale;
  const path = [
    ...verticals.map((value) => `M${((value - west) * scale).toFixed(2)} 0V${height.toFixed(1)}`),
    ...horizontals.map((value) => `M0 ${((north - value) * scale).toFixed(2)}H${width.toFixed(1)}`),
  ].join("");
  return <path d={path} fill="none" stroke="var(--map-grid-line)" strokeWidth="0.6" />;
}
