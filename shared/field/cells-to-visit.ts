import type { Entry } from "#shared/draw/draw.ts";
import { groupByUnit } from "./in-use.ts";

/** One cell that a crew goes to, however often it was picked. */
export interface CellToVisit {
  readonly stratum: string;
  readonly unit: number;
  /** The earliest of its positions in use: its place in the draw order. */
  readonly order: number;
  /** All its positions in use, ascending. Its count enters the estimate once for each. */
  readonly orders: readonly number[];
  /** How many positions: 2 is shown as ×2. */
  readonly times: number;
  /** Whether it is visited only because a reserve was opened or a pick was added. */
  readonly reserve: boolean;
}

/**
 * The cells to visit: one row a cell from the entries in use, in draw order within each stratum. It counts picks and
 * cells apart, so that nobody takes "60 picks, 57 cells to visit" for a missing row.
 */
export function cellsToVisit(
  strata: readonly { readonly stratum: string; readonly inUse: readonly Entry[] }[],
): CellToVisit[] {
  return strata.flatMap(({ stratum, inUse }) => {
    const byUnit = groupByUnit(inUse.toSorted((a, b) => a.position - b.position));
    return [...byUnit].map(([unit, entries]) => {
      const orders = entries.map((entry) => entry.position);
      const [order = 0] = orders;
      return { stratum, unit, order, orders, times: orders.length, reserve: entries.every((entry) => entry.reserve) };
    });
  });
}

/**
 * How many different cells n picks with replacement from N units are expected to hold: N·(1 − (1 − 1/N)ⁿ).
 * @throws RangeError where N is no whole number of at least 1 or n is negative.
 */
export function expectedDistinctCells(units: number, picks: number): number {
  if (!Number.isSafeInteger(units) || units < 1) throw new RangeError(`a frame has at least one unit, got ${units}`);
  if (!Number.isSafeInteger(picks) || picks < 0) throw new RangeError(`not a number of picks: ${picks}`);
  if (units === 1) return picks === 0 ? 0 : 1;
  return -units * Math.expm1(picks * Math.log1p(-1 / units));
}
