import { carefulSum } from "./moments.ts";
import type { EstimateResult } from "./result.ts";

/** A count this many times the next largest is worth a look at the sheet. */
const FAR = 10;
const FEWEST_CELLS = 3;

/**
 * The unit whose number is at least ten times the next largest of the cells (at least 10, where all others are zero), and
 * that next largest. Nothing where there are fewer than three cells.
 */
export function findFarAbove<Cell extends { readonly unit: number; readonly value: number }>(
  cells: readonly Cell[],
): { readonly cell: Cell; readonly nextLargest: number } | "none" {
  const byUnit = new Map(cells.map((cell) => [cell.unit, cell]));
  if (byUnit.size < FEWEST_CELLS) return "none";
  const [largest, second] = [...byUnit.values()].sort((a, b) => b.value - a.value);
  if (largest === undefined || second === undefined) return "none";
  const least = second.value === 0 ? FAR : FAR * second.value;
  return largest.value >= least ? { cell: largest, nextLargest: second.value } : "none";
}

/** The far larger count by name, with the total as it would be without its picks. It stays in the estimate. */
export function farAbove(
  units: number,
  picks: readonly { readonly unit: number; readonly label: string; readonly value: number }[],
): EstimateResult["farAbove"] {
  const found = findFarAbove(picks);
  if (found === "none") return { kind: "none-far-above" };
  const { unit, label, value } = found.cell;
  const rest = picks.filter((pick) => pick.unit !== unit).map((pick) => pick.value);
  const totalWithout = (units * carefulSum(rest.toSorted((a, b) => a - b))) / rest.length;
  return { kind: "far-above", unit, label, value, nextLargest: found.nextLargest, totalWithout };
}
