import { orient2d } from "robust-predicates";

/**
 * Which way a → b → c turns, exactly: 1 to the left (counter-clockwise), −1 to the right, 0 straight on or back.
 * For coordinates whose differences are exact in double precision, as whole millimetres are.
 */
export function turn(ax: number, ay: number, bx: number, by: number, cx: number, cy: number): -1 | 0 | 1 {
  // The package's sign is for a y axis that points down.
  const sign = orient2d(ax, ay, bx, by, cx, cy);
  return sign < 0 ? 1 : sign > 0 ? -1 : 0;
}
