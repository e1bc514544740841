import { BEFORE_UNIT, countText, listText, numberText, significantText } from "#shared/units/number-text.ts";

/**
 * Numbers, times and hashes on screen. How a number is written and rounded is shared/units/number-text.ts, how an estimate is
 * rounded by its error shared/estimate/rounding.ts. Full precision stays in files and data.
 */

/** A number with a fixed number of decimals and thousands parted from 1 000 up. Throws RangeError where it is not finite. */
export function formatNumber(value: number, decimals = 0): string {
  return numberText(value, decimals);
}

/** A number with the decimals that it has (a count of 2.5, a cell of 12.25 m), at most twelve significant figures. */
export function formatAsIs(value: number): string {
  const decimals = /\.(\d+)$/.exec(String(Number(value.toPrecision(12))))?.[1]?.length ?? 0;
  return formatNumber(value, decimals);
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
  return significantText(value, figures);
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
export function formatCount(value: number, one: string, many?: string): string {
  return countText(value, one, many);
}

/** "A", "A and B", "A, B and C". */
export function formatList(words: readonly string[]): string {
  return listText(words);
}
