import { Problem } from "#shared/problem.ts";
import { SQUARE_METRES_PER_HECTARE, WHOLE_CELL } from "#shared/units/metric.ts";

/**
 * The area that the counts speak for, in m², of a frame of equal cells.
 *
 *   count inside the boundary:  S·(cell area)/10⁹, with S the sum of the listed shares in billionths
 *   whole cells:                N·(cell area)
 *
 * Under "inside" an edge cell's count comes from its part inside only; dividing the mean by a whole cell's area would give
 * too low a density.
 * @param cellAreaMm2 whole square millimetres
 */
export function areaSpokenForM2(frame: {
  readonly countIn: "inside" | "whole";
  readonly units: number;
  readonly cellAreaMm2: bigint;
  readonly shareSumBillionths: bigint;
}): number {
  const { countIn, units, cellAreaMm2, shareSumBillionths } = frame;
  if (units < 1 || cellAreaMm2 <= 0n || shareSumBillionths <= 0n)
    throw new RangeError("a frame has cells with an area");
  const shares = countIn === "inside" ? shareSumBillionths : BigInt(units) * BigInt(WHOLE_CELL);
  // Billionths of mm² are 10⁻¹⁵ m²: the quotient to whole mm² first, so that nothing passes 2⁵³ for areas below 9000 km².
  const product = shares * cellAreaMm2;
  const whole = BigInt(WHOLE_CELL);
  return (Number(product / whole) + Number(product % whole) / 1e9) / 1e6;
}

/**
 * What a mean per cell is multiplied by to give a density per hectare: N·10 000/A, A the area spoken for in m².
 * @throws Problem `input-invalid` for an area that is not above zero.
 */
export function perHectare(units: number, areaM2: number): number {
  if (!(areaM2 > 0 && Number.isFinite(areaM2))) {
    throw new Problem("input-invalid", `An area of ${areaM2} m² cannot be. Give the area that the cells stand for.`);
  }
  return (units * SQUARE_METRES_PER_HECTARE) / areaM2;
}
