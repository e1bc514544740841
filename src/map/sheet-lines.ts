import type { LngLatOf } from "./planes.ts";
import type { PlaneBounds } from "./sheet-geometry.ts";

/** A line of the CRS's own grid: its value in metres and what the margin prints. */
export interface GridLine {
  readonly value: number;
  /** Figures in a light face before the bold ones; empty but on the line that is written in full. */
  readonly lead: string;
  readonly bold: string;
  readonly tail: string;
}

/** The closest grid lines on a sheet, in px, and the most of them along its longer side. */
const CLOSEST = 64;
const MOST = 9;

/** The smallest step of 1, 2 or 5 · 10^k metres that is at least 64 px on a sheet of so many px a metre and puts at most 9 steps along `longer` px. */
export function gridStep(scale: number, longer: number): number {
  if (!(scale > 0)) throw new RangeError(`needs a scale above zero, got ${scale}`);
  const least = Math.max(CLOSEST, longer / MOST) / scale;
  const power = 10 ** Math.floor(Math.log10(least));
  const factor = [1, 2, 5].find((one) => one * power >= least * 0.999999) ?? 10;
  return factor * power;
}

/** The step of the grid lines for what is in sight. */
export function stepOf(window: PlaneBounds & { readonly scale: number }): number {
  return gridStep(window.scale, Math.max(window.east - window.west, window.north - window.south) * window.scale);
}

/**
 * The grid lines from low to high with their figures: the last three bold, the first of them with its full value and `suffix` ("m E").
 * Above 1 km the thousands are the bold ones. `skip` metres at the low end stay without a figure, where the corner has no room.
 */
export function gridLines(low: number, high: number, step: number, suffix: string, skip: number): GridLine[] {
  const lines: GridLine[] = [];
  let written = false;
  for (let k = Math.ceil(low / step); k * step <= high; k += 1) {
    const value = k * step;
    const hasRoom = value - low >= skip;
    lines.push({
      value,
      ...(hasRoom ? figures(value, step, written ? "" : suffix) : { lead: "", bold: "", tail: "" }),
    });
    written ||= hasRoom;
  }
  return lines;
}

function figures(value: number, step: number, suffix: string): Omit<GridLine, "value"> {
  const sign = value < 0 ? "\u2212" : "";
  const digits = String(Math.abs(step < 1 ? Math.floor(value) : Math.round(value)));
  const fraction = step < 1 ? (Math.abs(value) % 1).toFixed(Math.min(3, Math.ceil(-Math.log10(step)))).slice(1) : "";
  const thousands = digits.slice(0, -3);
  const last = thousands === "" ? digits : digits.slice(-3);
  const full = suffix === "" ? "" : `\u202f${suffix}`;
  if (step >= 1000 && thousands !== "") {
    return {
      lead: full === "" ? "" : sign + thousands.slice(0, -3),
      bold: full === "" && thousands.length > 3 ? thousands.slice(-3) : thousands.slice(-3),
      tail: full === "" ? "\u202f000" : `\u202f000${full}`,
    };
  }
  return {
    lead: full === "" || thousands === "" ? (thousands === "" ? sign : "") : `${sign}${thousands}\u202f`,
    bold: last + fraction,
    tail: full,
  };
}

/** A mark of longitude or latitude on an edge of the sheet. */
export interface GraticuleTick {
  /** Metres along the edge: east on the lower edge, north on the right one. */
  readonly at: number;
  /** Whole seconds of arc. */
  readonly seconds: number;
  readonly text: string;
}

const SECOND_STEPS = [1, 2, 5, 10, 15, 30, 60, 120, 300, 600, 900, 1800, 3600, 7200, 18_000, 36_000];

/** Degrees of one edge as a function of metres along it must rise or fall steadily; ticks at whole steps of seconds, 4 to 9 of them. */
export function graticuleTicks(
  edge: (metres: number) => number,
  low: number,
  high: number,
  letters: readonly [string, string],
): GraticuleTick[] {
  const from = edge(low) * 3600;
  const to = edge(high) * 3600;
  const span = Math.abs(to - from);
  if (!(span > 0) || !Number.isFinite(span)) return [];
  const step = SECOND_STEPS.find((one) => span / one <= 8) ?? 72_000;
  const ticks: GraticuleTick[] = [];
  let previous: number | null = null;
  for (let k = Math.ceil(Math.min(from, to) / step); k * step <= Math.max(from, to); k += 1) {
    const seconds = k * step;
    const at = solve(edge, seconds / 3600, low, high);
    ticks.push({ at, seconds, text: angle(seconds, step, previous, letters) });
    previous = seconds;
  }
  return ticks;
}

/** Metres at which the edge has this many degrees: regula falsi, exact enough for a hundredth of a pixel after a few rounds. */
function solve(edge: (metres: number) => number, degrees: number, low: number, high: number): number {
  let a = low;
  let b = high;
  for (let round = 0; round < 6; round += 1) {
    const fa = edge(a) - degrees;
    const fb = edge(b) - degrees;
    if (fa === fb) return a;
    const next = a - (fa * (b - a)) / (fb - fa);
    if (Math.abs(fa) > Math.abs(fb)) a = next;
    else b = next;
  }
  return Math.min(high, Math.max(low, a));
}

/** "2°00′30″ E" for the first, "35″" while the minute stays, "2°01′00″" where it changes. */
function angle(
  seconds: number,
  step: number,
  previous: number | null,
  [positive, negative]: readonly [string, string],
): string {
  const total = Math.abs(seconds);
  const degrees = Math.floor(total / 3600);
  const minutes = Math.floor((total % 3600) / 60);
  const rest = total % 60;
  const two = (value: number) => String(value).padStart(2, "0");
  const full = `${degrees}°${step < 3600 ? `${two(minutes)}′` : ""}${step < 60 ? `${two(rest)}″` : ""}`;
  if (previous === null) return `${full}\u00a0${seconds < 0 ? negative : positive}`;
  const before = Math.abs(previous);
  if (step >= 3600 || Math.sign(previous) !== Math.sign(seconds)) return full;
  if (step >= 60) return Math.floor(before / 3600) === degrees ? `${two(minutes)}′` : full;
  return Math.floor(before / 60) === Math.floor(total / 60) ? `${two(rest)}″` : full;
}

/** Ticks of longitude on the lower edge and of latitude on the right one. */
export function sheetGraticule(
  bounds: PlaneBounds,
  lngLatOf: LngLatOf,
): { lower: GraticuleTick[]; right: GraticuleTick[] } {
  return {
    lower: graticuleTicks((east) => lngLatOf(east, bounds.south).lng, bounds.west, bounds.east, ["E", "W"]),
    right: graticuleTicks((north) => lngLatOf(bounds.east, north).lat, bounds.south, bounds.north, ["N", "S"]),
  };
}

/** A scale bar of a round number of metres, at most `widest` px at this many px a metre. */
export function scaleBar(scale: number, widest: number): { metres: number; px: number; label: string; half: string } {
  const most = widest / scale;
  const power = 10 ** Math.floor(Math.log10(most));
  const metres = ([5, 2, 1].find((factor) => factor * power <= most) ?? 1) * power;
  const inKilometres = metres >= 2000;
  const write = (value: number) => String(Number((inKilometres ? value / 1000 : value).toPrecision(6)));
  return {
    metres,
    px: metres * scale,
    label: `${write(metres)}\u00a0${inKilometres ? "km" : "m"}`,
    half: write(metres / 2),
  };
}
