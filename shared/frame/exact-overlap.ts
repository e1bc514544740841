/** An exact number: numerator over a denominator above 0. */
export interface Fraction {
  readonly numerator: bigint;
  readonly denominator: bigint;
}

/** Whole millimetres, y1 < y2. */
interface UpwardEdge {
  readonly x1: number;
  readonly y1: number;
  readonly x2: number;
  readonly y2: number;
}

const clamp = (value: bigint, low: bigint, high: bigint): bigint => (value < low ? low : value > high ? high : value);

/**
 * Twice the area to the right of an edge between the heights `bottom` and `top` and inside the columns' strip
 * left … left + width: 2·∫ clamp(right − x(y), 0, width) dy, exactly.
 *
 * With Δx, Δy > 0 the edge is west of the strip up to p and in it up to q; the integral is
 * 2·width·(p − bottom) + (q − p)·((right − x(p)) + (right − x(q))). All is kept multiplied by Δx (heights) and Δy (distances).
 * An edge that leans west is turned upside down first, which keeps areas.
 */
export function clippedOverlap(edge: UpwardEdge, left: number, width: number, bottom: number, top: number): Fraction {
  const leansWest = edge.x2 < edge.x1;
  const x1 = BigInt(leansWest ? edge.x2 : edge.x1);
  const y1 = BigInt(leansWest ? -edge.y2 : edge.y1);
  const low = BigInt(leansWest ? -top : bottom);
  const high = BigInt(leansWest ? -bottom : top);
  const deltaX = BigInt(Math.abs(edge.x2 - edge.x1));
  const deltaY = BigInt(edge.y2 - edge.y1);
  const right = BigInt(left + width);
  const wide = BigInt(width);
  if (deltaX === 0n) return { numerator: 2n * clamp(right - x1, 0n, wide) * (high - low), denominator: 1n };
  const base = y1 * deltaX;
  const p = clamp(base + (right - wide - x1) * deltaY, low * deltaX, high * deltaX);
  const q = clamp(base + (right - x1) * deltaY, low * deltaX, high * deltaX);
  const numerator =
    2n * wide * (p - low * deltaX) * deltaY + (q - p) * (2n * (right - x1) * deltaY - (p + q - 2n * base));
  const denominator = deltaX * deltaY;
  return numerator % denominator === 0n
    ? { numerator: numerator / denominator, denominator: 1n }
    : { numerator, denominator };
}

/** The sum; whole numbers are added first, fractions pairwise, so that denominators stay short. */
export function sumOf(fractions: readonly Fraction[]): Fraction {
  let whole = 0n;
  let level: Fraction[] = [];
  for (const fraction of fractions) {
    if (fraction.denominator === 1n) whole += fraction.numerator;
    else level.push(fraction);
  }
  while (level.length > 1) {
    const sums: Fraction[] = [];
    for (let i = 0; i < level.length; i += 2) {
      const a = level[i];
      const b = level[i + 1];
      if (a !== undefined) sums.push(b === undefined ? a : added(a, b));
    }
    level = sums;
  }
  return added(level[0] ?? { numerator: 0n, denominator: 1n }, { numerator: whole, denominator: 1n });
}

function added(a: Fraction, b: Fraction): Fraction {
  if (a.denominator === b.denominator) return { numerator: a.numerator + b.numerator, denominator: a.denominator };
  return {
    numerator: a.numerator * b.denominator + b.numerator * a.denominator,
    denominator: a.denominator * b.denominator,
  };
}
