/** All numbers, times and hashes on screen are written here, and rounded nowhere else. Full precision stays in files and data. */

/** U+202F parts thousands; U+00A0 stands before a unit or a per cent sign; U+2212 is the minus. */
const THOUSANDS = "\u202f";
const BEFORE_UNIT = "\u00a0";
const MINUS = "\u2212";

/** A number with a fixed number of decimals and thousands parted from 1 000 up. Minus zero loses its sign. Throws RangeError where it is not finite. */
export function formatNumber(value: number, decimals = 0): string {
  if (!Number.isFinite(value)) throw new RangeError(`cannot write ${value} as a number`);
  const fixed = Math.abs(value).toFixed(decimals);
  const [whole = "", fraction] = fixed.split(".");
  const parted = whole.replaceAll(/\B(?=(\d{3})+$)/g, THOUSANDS);
  const negative = value < 0 && /[1-9]/.test(fixed);
  return `${negative ? MINUS : ""}${parted}${fraction === undefined ? "" : `.${fraction}`}`;
}

/** A number with the decimals that it has (a count of 2.5, a cell of 12.25 m), at most twelve significant figures. */
export function formatAsIs(value: number): string {
  const decimals = /\.(\d+)$/.exec(String(Number(value.toPrecision(12))))?.[1]?.length ?? 0;
  return formatNumber(value, decimals);
}

/** A whole number beyond 2⁵³, as text of digits. */
export function formatWhole(value: bigint): string {
  const digits = (value < 0n ? -value : value).toString().replaceAll(/\B(?=(\d{3})+$)/g, THOUSANDS);
  return value < 0n ? `${MINUS}${digits}` : digits;
}

/** Number and unit with the space that belongs between them: "20 m". */
export function formatUnit(value: string, unit: string): string {
  return `${value}${BEFORE_UNIT}${unit}`;
}

/** A share as per cent with one decimal: 0.2048 → "20.5 %". */
export function formatPercent(share: number, decimals = 1): string {
  return `${formatNumber(share * 100, decimals)}${BEFORE_UNIT}%`;
}

/** An area: hectares with two decimals, square metres below 0.01 ha. */
export function formatArea(squareMetres: number): string {
  if (Math.abs(squareMetres) < 100) {
    const decimals = Math.abs(squareMetres) < 10 && !Number.isInteger(squareMetres) ? 1 : 0;
    return `${formatNumber(squareMetres, decimals)}${BEFORE_UNIT}m²`;
  }
  return `${formatHectares(squareMetres)}${BEFORE_UNIT}ha`;
}

/** Square metres as hectares with two decimals, without the unit: for a column whose head says ha. */
export function formatHectares(squareMetres: number): string {
  return formatNumber(squareMetres / 10_000, 2);
}

/** A length in metres: whole on maps and for cells, or with the decimals that it has. */
export function formatMetres(metres: number): string {
  return formatUnit(formatAsIs(metres), "m");
}

/** Whole millimetres as metres: 20 000 → "20 m", 12 250 → "12.25 m". */
export function formatMillimetres(millimetres: number): string {
  return formatMetres(millimetres / 1000);
}

/** Rounded to so many significant figures: 2 925.7 with 3 → "2 930". Zero stays "0". */
export function formatSignificant(value: number, figures: number): string {
  if (!Number.isInteger(figures) || figures < 1) throw new RangeError(`needs at least one figure, got ${figures}`);
  if (value === 0) return "0";
  const rounded = Number(value.toPrecision(figures));
  const magnitude = Math.floor(Math.log10(Math.abs(rounded)));
  return formatNumber(rounded, Math.max(0, figures - 1 - magnitude));
}

/**
 * An estimate as precisely as its standard error warrants: rounded at the place of the second figure of the standard error. 2 926 with
 * 599 → "2 930"; 3.948 with 0.808 → "3.95". A standard error of zero leaves the number with at most two decimals.
 */
export function formatByError(value: number, standardError: number): string {
  if (!(standardError > 0)) return formatAsIs(Number(value.toFixed(2)));
  const place = Math.floor(Math.log10(standardError)) - 1;
  if (place < 0) return formatNumber(value, Math.min(12, -place));
  const step = Number(`1e${place}`);
  return formatNumber(Math.round(value / step) * step);
}

/** A hash as its first 8 and last 6 characters. */
export function formatHash(hash: string): string {
  return hash.length <= 16 ? hash : `${hash.slice(0, 8)}…${hash.slice(-6)}`;
}

/** A seed between straight quotes, as it is. */
export function formatSeed(seed: string): string {
  return `"${seed}"`;
}

const MONTHS = [
  "January",
  "February",
  "March",
  "April",
  "May",
  "June",
  "July",
  "August",
  "September",
  "October",
  "November",
  "December",
];

function two(value: number): string {
  return String(value).padStart(2, "0");
}

function instant(iso: string): Date {
  const date = new Date(iso);
  if (Number.isNaN(date.getTime())) throw new RangeError(`cannot read "${iso}" as a time`);
  return date;
}

/** The day in UTC: "3 June 2031". */
export function formatDay(iso: string): string {
  const date = instant(iso);
  return `${date.getUTCDate()} ${MONTHS[date.getUTCMonth()] ?? ""} ${date.getUTCFullYear()}`;
}

/** The time of day in UTC, without saying so: "09:12", for a column whose head says UTC. */
export function formatTimeOfDay(iso: string): string {
  const date = instant(iso);
  return `${two(date.getUTCHours())}:${two(date.getUTCMinutes())}`;
}

/** Day and time in UTC, as on records: "3 June 2031, 09:12 UTC". */
export function formatTime(iso: string): string {
  return `${formatDay(iso)}, ${formatTimeOfDay(iso)} UTC`;
}

/** A file's size: "41 KB", "2.3 MB" (powers of 1 000). */
export function formatBytes(bytes: number): string {
  if (bytes < 1000) return formatUnit(formatNumber(bytes), "bytes");
  if (bytes < 999_500) return formatUnit(formatNumber(bytes / 1000), "KB");
  return formatUnit(formatNumber(bytes / 1_000_000, 1), "MB");
}

/** "1 cell", "741 cells": a number with its noun. */
export function formatCount(value: number, one: string, many = `${one}s`): string {
  return `${formatNumber(value)} ${value === 1 ? one : many}`;
}

/** "A", "A and B", "A, B and C". */
export function formatList(words: readonly string[]): string {
  if (words.length <= 1) return words[0] ?? "";
  return `${words.slice(0, -1).join(", ")} and ${words.at(-1) ?? ""}`;
}
