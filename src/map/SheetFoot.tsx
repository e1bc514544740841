import type { ReactNode } from "react";
import { NorthArrow } from "./NorthArrow.tsx";
import { ScaleBar } from "./ScaleBar.tsx";
import { stepOf } from "./sheet-lines.ts";
import type { SheetWindow } from "./use-planar-map.ts";

interface SheetFootProps {
  readonly window: SheetWindow;
  readonly compact: boolean;
  /** Beside a list: less room for the bar. */
  readonly narrow: boolean;
  readonly crsName: string | null;
  readonly legend: ReactNode;
  /** Whom the base map names; undefined where there is none. */
  readonly attribution: string | undefined;
}

/** Below the sheet: scale bar and CRS, legend, north. On a phone the bar lies inside the sheet and only the legend below it. */
export function SheetFoot({ window, compact, narrow, crsName, legend, attribution }: SheetFootProps) {
  const named = attribution !== undefined && <p className="q-sheet-attribution">{`Base map: ${attribution}`}</p>;
  if (compact) {
    if (legend === undefined && named === false) return null;
    return (
      <figcaption className="q-sheet-foot q-sheet-foot-compact">
        {legend}
        {named}
      </figcaption>
    );
  }
  const step = stepOf(window);
  const every = step >= 1000 ? `${step / 1000}\u00a0km` : `${step}\u00a0m`;
  return (
    <figcaption className="q-sheet-foot">
      <div>
        <ScaleBar scale={window.scale} widest={narrow ? 130 : 200} parts={4} />
        <p>{crsName === null ? "Longitude and latitude, WGS\u00a084" : `${crsName}, lines every ${every}`}</p>
      </div>
      <div className="q-sheet-legend">{legend}</div>
      <NorthArrow />
      {named}
    </figcaption>
  );
}
