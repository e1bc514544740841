import { Fragment } from "react";
import type { LngLatOf } from "./planes.ts";
import type { BorderPlace } from "./SheetBorder.tsx";
import { sheetGraticule } from "./sheet-lines.ts";
import type { SheetWindow } from "./use-planar-map.ts";

/** Minutes and seconds are set in the serif: the sans has no ′ and ″. */
function Angle({ text }: { readonly text: string }) {
  return text.split(/([′″])/).map((part, index) =>
    part === "′" || part === "″" ? (
      <tspan key={index} className="q-sheet-prime">
        {part}
      </tspan>
    ) : (
      <Fragment key={index}>{part}</Fragment>
    ),
  );
}

/** Half the width of a figure in px, about: what would pass the corner of the sheet is left out. */
function roomOf(text: string): number {
  return 6 + 3.4 * text.length;
}

/** Longitude below the sheet, latitude at its right. */
export function SheetAngles({
  window,
  border,
  lngLatOf,
}: {
  readonly window: SheetWindow;
  readonly border: BorderPlace;
  readonly lngLatOf: LngLatOf;
}) {
  const graticule = sheetGraticule(window, lngLatOf);
  const { left, top, right, bottom, x, y } = border;
  return (
    <g className="q-sheet-angles">
      {graticule.lower
        .filter((tick) => x(tick.at) > left + roomOf(tick.text) && x(tick.at) < right - roomOf(tick.text))
        .map((tick) => (
          <Fragment key={tick.seconds}>
            <path d={`M${x(tick.at)} ${bottom + 5}v6`} stroke="var(--map-neatline)" />
            <text x={x(tick.at)} y={bottom + 23}>
              <Angle text={tick.text} />
            </text>
          </Fragment>
        ))}
      {graticule.right
        .filter((tick) => y(tick.at) < bottom - roomOf(tick.text) && y(tick.at) > top + roomOf(tick.text))
        .map((tick) => (
          <Fragment key={tick.seconds}>
            <path d={`M${right + 5} ${y(tick.at)}h6`} stroke="var(--map-neatline)" />
            <text transform={`translate(${right + 23} ${y(tick.at)}) rotate(-90)`}>
              <Angle text={tick.text} />
            </text>
          </Fragment>
        ))}
    </g>
  );
}
