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

/** Instants (ISO 8601 text) on the clock of one time zone. Each throws RangeError for what is no time. */
export interface Times {
  /** The zone's name: "Europe/Paris"; "UTC" where this browser does not know it. */
  readonly zone: string;
  /** Day and time with the zone's abbreviation: "3 June 2031, 11:12 CEST". */
  readonly time: (iso: string) => string;
  /** "3 June 2031" */
  readonly day: (iso: string) => string;
  /** "11:12", where the zone is said once beside it. */
  readonly timeOfDay: (iso: string) => string;
  /** On a list of what happened: "today, 11:12", "yesterday, 17:44", else the day. */
  readonly recent: (iso: string) => string;
}

const MS_A_DAY = 86_400_000;

/** The one way from an instant to what is read on screen. */
export function timesIn(timeZone: string): Times {
  const clock = clockOf(timeZone);
  const partsOf = (iso: string) => {
    const date = new Date(iso);
    if (Number.isNaN(date.getTime())) throw new RangeError(`cannot read "${iso}" as a time`);
    const parts = clock.formatToParts(date);
    return (type: Intl.DateTimeFormatPartTypes) => parts.find((part) => part.type === type)?.value ?? "";
  };
  const day = (iso: string) => {
    const part = partsOf(iso);
    return `${part("day")} ${part("month")} ${part("year")}`;
  };
  const timeOfDay = (iso: string) => {
    const part = partsOf(iso);
    return `${part("hour")}:${part("minute")}`;
  };
  // Zones without an abbreviation of their own come as "GMT-4".
  const abbreviation = (iso: string) =>
    partsOf(iso)("timeZoneName")
      .replace(/^GMT(?=[+-])/, "UTC")
      .replace("-", "\u2212");
  const recent = (iso: string) => {
    const at = day(iso);
    if (at === day(new Date().toISOString())) return `today, ${timeOfDay(iso)}`;
    if (at === day(new Date(Date.now() - MS_A_DAY).toISOString())) return `yesterday, ${timeOfDay(iso)}`;
    return at;
  };
  return {
    zone: clock.resolvedOptions().timeZone,
    day,
    timeOfDay,
    recent,
    time: (iso) => `${day(iso)}, ${timeOfDay(iso)} ${abbreviation(iso)}`,
  };
}

function clockOf(timeZone: string): Intl.DateTimeFormat {
  const shown = {
    year: "numeric",
    month: "long",
    day: "numeric",
    hour: "2-digit",
    minute: "2-digit",
    hourCycle: "h23",
    timeZoneName: "short",
  } as const;
  try {
    return new Intl.DateTimeFormat("en-GB", { ...shown, timeZone });
  } catch {
    return new Intl.DateTimeFormat("en-GB", { ...shown, timeZone: "UTC" });
  }
}

/** A size of a file or disk: "41 KB", "2.3 MB", "82.8 GB" (powers of 1 000). */
export function formatBytes(bytes: number): string {
  if (bytes < 1000) return formatUnit(formatNumber(bytes), "bytes");
  if (bytes < 999_500) return formatUnit(formatNumber(bytes / 1000), "KB");
  if (bytes < 999_950_000) return formatUnit(formatNumber(bytes / 1_000_000, 1), "MB");
  return formatUnit(formatNumber(bytes / 1_000_000_000, 1), "GB");
}

/** "1 cell", "741 cells": a number with its noun. */
export function formatCount(value: number, one: string, many?: string): string {
  return countText(value, one, many);
}

/** "A", "A and B", "A, B and C". */
export function formatList(words: readonly string[]): string {
  return listText(words);
}
