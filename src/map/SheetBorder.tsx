import type { LngLatOf } from "./planes.ts";
import { SheetAngles } from "./SheetAngles.tsx";
import { gridLines, sheetGraticule, stepOf, type GridLine } from "./sheet-lines.ts";
import type { SheetMargins } from "./sheet-margins.ts";
import type { ElementSize } from "../components/ui/use-element-size.ts";
import type { SheetWindow } from "./use-planar-map.ts";

interface SheetBorderProps {
  readonly window: SheetWindow;
  readonly margins: SheetMargins;
  readonly size: ElementSize;
  readonly inMetres: boolean;
  readonly lngLatOf: LngLatOf | undefined;
}

/** The frame of the sheet in px: inner neat line, and from metres to px. */
export interface BorderPlace {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
  readonly x: (east: number) => number;
  readonly y: (north: number) => number;
}

function Figures({ line }: { readonly line: GridLine }) {
  return (
    <>
      {line.lead}
      <tspan fontWeight="700">{line.bold}</tspan>
      {line.tail}
    </>
  );
}

/** Where dark and light change: each line of the grid begins a dark half. */
interface BarRhythm {
  readonly step: number;
  /** The place of any one line. */
  readonly phase: number;
}

/** The dark halves of the bar: from each line half a step on. */
function barsAlong(low: number, high: number, { step, phase }: BarRhythm): [number, number][] {
  const bars: [number, number][] = [];
  for (let k = Math.floor((low - phase) / step); phase + k * step < high; k += 1) {
    if (phase + (k + 0.5) * step > low)
      bars.push([Math.max(low, phase + k * step), Math.min(high, phase + (k + 0.5) * step)]);
  }
  return bars;
}

/** The rhythm of the lines that are drawn: the CRS's grid, or the graticule where there is none. */
function rhythms(
  window: SheetWindow,
  inMetres: boolean,
  lngLatOf: LngLatOf | undefined,
): { across: BarRhythm; up: BarRhythm } {
  const step = stepOf(window);
  const metres = { step, phase: 0 };
  if (inMetres || lngLatOf === undefined) return { across: metres, up: metres };
  const { lower, right } = sheetGraticule(window, lngLatOf);
  const of = (ticks: readonly { at: number }[]) => {
    const [first, second] = ticks;
    return first === undefined || second === undefined
      ? metres
      : { step: Math.abs(second.at - first.at), phase: first.at };
  };
  return { across: of(lower), up: of(right) };
}

function barPath(
  window: SheetWindow,
  rhythm: ReturnType<typeof rhythms>,
  { left, top, right, bottom, x, y }: BorderPlace,
): string {
  const across = barsAlong(window.west, window.east, rhythm.across).map(
    ([from, to]) => `M${x(from)} ${top - 2.5}H${x(to)}M${x(from)} ${bottom + 2.5}H${x(to)}`,
  );
  const up = barsAlong(window.south, window.north, rhythm.up).map(
    ([from, to]) => `M${left - 2.5} ${y(from)}V${y(to)}M${right + 2.5} ${y(from)}V${y(to)}`,
  );
  return across.join("") + up.join("");
}

/** Neat line, alternating bar, the CRS's metres above and at the left, the graticule below and at the right. */
export function SheetBorder({ window, margins, size, inMetres, lngLatOf }: SheetBorderProps) {
  const { west, east, south, north, scale } = window;
  const { left, top } = margins;
  const right = size.width - margins.right;
  const bottom = size.height - margins.bottom;
  if (right - left < 40 || bottom - top < 40) return null;
  const border = {
    left,
    top,
    right,
    bottom,
    x: (value: number) => left + (value - west) * scale,
    y: (value: number) => top + (north - value) * scale,
  };
  const step = stepOf(window);
  const columns = inMetres ? gridLines(west, east, step, "m\u202fE", 60 / scale) : [];
  const rows = inMetres ? gridLines(south, north, step, "m\u202fN", 60 / scale) : [];
  return (
    <svg className="q-sheet-border" width={size.width} height={size.height} aria-hidden="true">
      <rect
        x={left}
        y={top}
        width={right - left}
        height={bottom - top}
        fill="none"
        stroke="var(--map-neatline)"
        strokeWidth="0.8"
      />
      <rect
        x={left - 5}
        y={top - 5}
        width={right - left + 10}
        height={bottom - top + 10}
        fill="none"
        stroke="var(--map-neatline)"
        strokeWidth="1.6"
      />
      <path
        d={barPath(window, rhythms(window, inMetres, lngLatOf), border)}
        stroke="var(--map-neatline)"
        strokeWidth="2.2"
      />
      <g className="q-sheet-figures">
        {columns.map((line) =>
          line.bold === "" || border.x(line.value) > right - 12 ? null : (
            <text key={line.value} x={border.x(line.value)} y={top - 10}>
              <Figures line={line} />
            </text>
          ),
        )}
        {rows.map((line) =>
          line.bold === "" || border.y(line.value) < top + 12 ? null : (
            <text key={line.value} transform={`translate(${left - 10} ${border.y(line.value)}) rotate(-90)`}>
              <Figures line={line} />
            </text>
          ),
        )}
      </g>
      {lngLatOf !== undefined && !margins.compact && (
        <SheetAngles window={window} border={border} lngLatOf={lngLatOf} />
      )}
    </svg>
  );
}
