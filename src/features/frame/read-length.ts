import { LARGEST_SIDE_MM } from "#shared/frame/cell-spec.ts";
import { FARTHEST_MM } from "#shared/geometry/rings.ts";
import { formatMillimetres } from "../../components/ui/format.ts";
import { readNumber } from "../../components/ui/read-number.ts";

/** A length that was typed, in whole millimetres, or what is wrong with it and what would do. */
export type LengthReading =
  { readonly ok: true; readonly millimetres: number } | { readonly ok: false; readonly message: string };

const UNITS: Readonly<Record<string, number>> = {
  "": 1000,
  m: 1000,
  metre: 1000,
  metres: 1000,
  meter: 1000,
  meters: 1000,
  mm: 1,
  cm: 10,
  km: 1_000_000,
};

const refused = (message: string): LengthReading => ({ ok: false, message });

/** "20", "20 m", "20,5", "1 500 m", "50 cm"; a comma before three figures could part thousands and is asked about. */
function readMillimetres(text: string, example: string): LengthReading {
  const match = /^(.*?)\s*([A-Za-zµ°"'′″]*)$/.exec(text.trim());
  const number = match?.[1] ?? "";
  const unit = (match?.[2] ?? "").toLowerCase();
  if (number === "") return refused(`Write metres, for example ${example}.`);
  const factor = UNITS[unit];
  if (factor === undefined)
    return refused(`“${unit}” is no unit that is read here. Write metres, for example ${example}.`);
  const doubtful = /^([+\-−]?\d{1,3}),(\d{3})$/.exec(number);
  if (doubtful !== null) {
    const [, whole = "", rest = ""] = doubtful;
    return refused(`“${number}” can be read in two ways. Write ${whole}${rest} or ${whole}.${rest}.`);
  }
  const value = readNumber(number);
  if (value === null) return refused(`“${text.trim()}” is no length. Write metres, for example ${example}.`);
  const millimetres = Number((value * factor).toPrecision(15));
  if (!Number.isInteger(millimetres))
    return refused("Lengths are kept in whole millimetres. Use at most three decimals of a metre.");
  return { ok: true, millimetres };
}

/** The side of a square cell: above 0, even millimetres, so that every centre is a whole millimetre too. */
export function readSide(text: string): LengthReading {
  if (text.trim() === "") return refused("Say how long the side of a cell is, for example 20 m.");
  const reading = readMillimetres(text, "20 m");
  if (!reading.ok) return reading;
  const { millimetres } = reading;
  if (millimetres <= 0) return refused("The side of a cell is above zero. Write metres, for example 20 m.");
  if (millimetres > LARGEST_SIDE_MM) return refused("No cell is wider than 1 000 km. Write metres, for example 20 m.");
  if (millimetres % 2 !== 0) {
    const [below, above] = [Math.max(2, millimetres - 1), millimetres + 1];
    return refused(
      `A side is an even number of millimetres. Use ${formatMillimetres(below)} or ${formatMillimetres(above)}.`,
    );
  }
  return reading;
}

/** A coordinate of the grid's origin: any whole millimetre of the plane, below zero too. */
export function readOrigin(text: string): LengthReading {
  if (text.trim() === "") return refused("Write a coordinate in metres; 0 is the usual one.");
  const reading = readMillimetres(text, "0");
  if (!reading.ok) return reading;
  if (Math.abs(reading.millimetres) > FARTHEST_MM)
    return refused("No plane of the Earth reaches that far. Write metres.");
  return reading.millimetres === 0 ? { ok: true, millimetres: 0 } : reading;
}

/** Millimetres as they are shown in a field: "20", "12.25". */
export function lengthText(millimetres: number): string {
  return String(millimetres / 1000);
}
