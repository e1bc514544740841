import type { ReactNode } from "react";
import { NorthArrow } from "./NorthArrow.tsx";
import { ScaleBar } from "./ScaleBar.tsx";
import { gridStep } from "./sheet-lines.ts";
import type { PlaneBounds } from "./sheet-geometry.ts";

interface SheetFootProps {
  readonly scale: number;
  readonly compact: boolean;
  readonly crsName: string | null;
  readonly legend: ReactNode;
  /** What is in sight, for the step of the grid lines; null where there are none. */
  readonly inSight: PlaneBounds | null;
}

/** Below the sheet: scale bar and CRS, legend, north. On a phone the bar lies inside the sheet and only the legend below it. */
export function SheetFoot({ scale, compact, crsName, legend, inSight }: SheetFootProps) {
  if (compact) {
    return (
      <>
        <div className="q-sheet-scale-inside">
          <ScaleBar scale={scale} widest={90} parts={1} />
        </div>
        {legend !== undefined && <figcaption className="q-sheet-foot q-sheet-foot-compact">{legend}</figcaption>}
      </>
    );
  }
  const step = inSight === null ? null : gridStep(Math.max(inSight.east - inSight.west, inSight.north - inSight.south));
  const lines = step === null ? "" : `, lines every ${step >= 1000 ? `${step / 1000}\u00a0km` : `${step}\u00a0m`}`;
  return (
    <figcaption className="q-sheet-foot">
      <div>
        <ScaleBar scale={scale} widest={200} parts={4} />
        <p>{crsName === null ? "Longitude and latitude, WGS\u00a084" : `${crsName}${lines}`}</p>
      </div>
      <div className="q-sheet-legend">{legend}</div>
      <NorthArrow />
    </figcaption>
  );
}
