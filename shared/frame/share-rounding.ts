import { WHOLE_CELL } from "#shared/units/metric.ts";

/** Given back by `roundedShare` where a sum that may be off does not decide the rounding. */
export const UNDECIDED = -1;

/** Whole billionths of overlap ÷ cell, half up (rule R3), of exact numbers: ⌊(2·10⁹·overlap + cell·denominator) / (2·cell·denominator)⌋. */
export function exactShare(overlap: bigint, denominator: bigint, cell: bigint): number {
  const whole = cell * denominator;
  return Number((2_000_000_000n * overlap + whole) / (2n * whole));
}

/**
 * Whole billionths of overlap ÷ cell, half up, where `overlap` is a double whose share is off by at most `doubt`
 * billionths; UNDECIDED where a half lies within the doubt. The doubt covers the rounding of this division too.
 */
export function roundedShare(overlap: number, cell: number, doubt: number): number {
  const raised = (overlap / cell) * WHOLE_CELL + 0.5;
  const rounded = Math.floor(raised);
  const rest = raised - rounded;
  return rest < doubt || rest > 1 - doubt ? UNDECIDED : rounded;
}
