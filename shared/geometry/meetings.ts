import { turn } from "./turn.ts";

/** Where edges are to be cut. */
export interface Cuts {
  readonly edge: number[];
  readonly x: number[];
  readonly y: number[];
  /** x, y of crossings rounded to whole millimetres: cutting there bends edges, so that all must be snapped. */
  readonly rounded: number[];
}

export const noCuts = (): Cuts => ({ edge: [], x: [], y: [], rounded: [] });

function cut(cuts: Cuts, edge: number, x: number, y: number): void {
  cuts.edge.push(edge);
  cuts.x.push(x);
  cuts.y.push(y);
}

const isBetween = (value: number, a: number, b: number): boolean =>
  a < b ? a < value && value < b : b < value && value < a;

/** Whether a point on an edge's line lies between its ends, neither of them. */
function isInside(ends: Float64Array, edge: number, x: number, y: number): boolean {
  const x1 = ends[4 * edge] ?? 0;
  const x2 = ends[4 * edge + 2] ?? 0;
  return x1 === x2 ? isBetween(y, ends[4 * edge + 1] ?? 0, ends[4 * edge + 3] ?? 0) : isBetween(x, x1, x2);
}

/**
 * Finds, exactly, where two edges meet other than at an end of both, and notes the cuts that undo it: at an end that lies inside the
 * other edge, or at a crossing. Gives whether there is any.
 */
export function meet(ends: Float64Array, a: number, b: number, cuts: Cuts): boolean {
  const ax1 = ends[4 * a] ?? 0;
  const ay1 = ends[4 * a + 1] ?? 0;
  const ax2 = ends[4 * a + 2] ?? 0;
  const ay2 = ends[4 * a + 3] ?? 0;
  const bx1 = ends[4 * b] ?? 0;
  const by1 = ends[4 * b + 1] ?? 0;
  const bx2 = ends[4 * b + 2] ?? 0;
  const by2 = ends[4 * b + 3] ?? 0;
  const b1 = turn(ax1, ay1, ax2, ay2, bx1, by1);
  const b2 = turn(ax1, ay1, ax2, ay2, bx2, by2);
  if (b1 === b2 && b1 !== 0) return false;
  const a1 = turn(bx1, by1, bx2, by2, ax1, ay1);
  const a2 = turn(bx1, by1, bx2, by2, ax2, ay2);
  if (a1 === a2 && a1 !== 0) return false;
  if (a1 * a2 < 0 && b1 * b2 < 0) {
    noteCrossing(ends, a, b, cuts);
    return true;
  }
  const before = cuts.edge.length;
  if (b1 === 0 && isInside(ends, a, bx1, by1)) cut(cuts, a, bx1, by1);
  if (b2 === 0 && isInside(ends, a, bx2, by2)) cut(cuts, a, bx2, by2);
  if (a1 === 0 && isInside(ends, b, ax1, ay1)) cut(cuts, b, ax1, ay1);
  if (a2 === 0 && isInside(ends, b, ax2, ay2)) cut(cuts, b, ax2, ay2);
  return cuts.edge.length > before;
}

const floorDivide = (a: bigint, b: bigint): bigint => (a % b !== 0n && a < 0n !== b < 0n ? a / b - 1n : a / b);

/** A proper crossing: a cut of both where it is on whole millimetres, otherwise a rounded one (half up). */
function noteCrossing(ends: Float64Array, a: number, b: number, cuts: Cuts): void {
  const at = (edge: number, index: number): bigint => BigInt(ends[4 * edge + index] ?? 0);
  const alongX = at(a, 2) - at(a, 0);
  const alongY = at(a, 3) - at(a, 1);
  const otherX = at(b, 2) - at(b, 0);
  const otherY = at(b, 3) - at(b, 1);
  // The crossing is at first end of a + along·part/whole.
  const part = otherX * (at(b, 1) - at(a, 1)) - otherY * (at(b, 0) - at(a, 0));
  const whole = otherX * alongY - otherY * alongX;
  const x = at(a, 0) + floorDivide(2n * alongX * part + whole, 2n * whole);
  const y = at(a, 1) + floorDivide(2n * alongY * part + whole, 2n * whole);
  if ((alongX * part) % whole === 0n && (alongY * part) % whole === 0n) {
    cut(cuts, a, Number(x), Number(y));
    cut(cuts, b, Number(x), Number(y));
  } else cuts.rounded.push(Number(x), Number(y));
}
