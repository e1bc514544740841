import { findFarAbove } from "#shared/counts/far-above.ts";
import { carefulSum } from "./moments.ts";
import type { EstimateResult } from "./result.ts";

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
