import type { PlaneArea, Ring } from "#shared/geometry/rings.ts";
import type { CellSpec } from "#shared/frame/cell-spec.ts";

/**
 * Shares and centres by another method than the product's: every ring is clipped to every cell of its bounds, corner by corner, in
 * exact fractions (Sutherland and Hodgman). Slow on purpose: nothing here is rounded, guessed or shared with the code it checks.
 */
interface Fraction {
  readonly n: bigint;
  readonly d: bigint;
}

interface Corner {
  readonly x: Fraction;
  readonly y: Fraction;
}

const whole = (value: number): Fraction => ({ n: BigInt(value), d: 1n });
const subtract = (a: Fraction, b: Fraction): Fraction => ({ n: a.n * b.d - b.n * a.d, d: a.d * b.d });
const add = (a: Fraction, b: Fraction): Fraction => ({ n: a.n * b.d + b.n * a.d, d: a.d * b.d });
const multiply = (a: Fraction, b: Fraction): Fraction => ({ n: a.n * b.n, d: a.d * b.d });
const divide = (a: Fraction, b: Fraction): Fraction =>
  b.n < 0n ? { n: -a.n * b.d, d: a.d * -b.n } : { n: a.n * b.d, d: a.d * b.n };
const isNegative = (a: Fraction): boolean => a.n < 0n;

/** Keeps what lies on one side of a vertical or horizontal line. */
function clip(ring: readonly Corner[], axis: "x" | "y", at: number, keepAbove: boolean): Corner[] {
  const other = axis === "x" ? "y" : "x";
  const line = whole(at);
  const inside = (corner: Corner): boolean =>
    !isNegative(keepAbove ? subtract(corner[axis], line) : subtract(line, corner[axis]));
  return ring.flatMap((corner, i) => {
    const before = ring[(i + ring.length - 1) % ring.length] ?? corner;
    const kept = inside(corner) ? [corner] : [];
    if (inside(before) === inside(corner)) return kept;
    const part = divide(subtract(line, before[axis]), subtract(corner[axis], before[axis]));
    const across = add(before[other], multiply(part, subtract(corner[other], before[other])));
    const crossing: Corner = axis === "x" ? { x: line, y: across } : { x: across, y: line };
    return [crossing, ...kept];
  });
}

function twiceArea(ring: readonly Corner[]): Fraction {
  let sum = whole(0);
  ring.forEach((a, i) => {
    const b = ring[(i + 1) % ring.length] ?? a;
    sum = add(sum, subtract(multiply(a.x, b.y), multiply(b.x, a.y)));
  });
  return isNegative(sum) ? { n: -sum.n, d: sum.d } : sum;
}

function cornersOf(ring: Ring): Corner[] {
  return Array.from({ length: ring.length / 2 }, (_, i) => ({
    x: whole(ring[2 * i] ?? 0),
    y: whole(ring[2 * i + 1] ?? 0),
  }));
}

/** Even–odd crossing, half-open, straight from rule R3: the place an infinitesimal step to the north-east of the centre. */
function centreIsIn(area: PlaneArea, x: number, y: number): boolean {
  let crossings = 0;
  for (const ring of area.polygons.flat()) {
    for (let i = 0; i < ring.length; i += 2) {
      const x1 = ring[i] ?? 0;
      const y1 = ring[i + 1] ?? 0;
      const x2 = ring[(i + 2) % ring.length] ?? 0;
      const y2 = ring[(i + 3) % ring.length] ?? 0;
      if (y1 <= y === y2 <= y) continue;
      const at = add(whole(x1), divide({ n: BigInt(y - y1) * BigInt(x2 - x1), d: 1n }, whole(y2 - y1)));
      if (!isNegative(subtract(whole(x), at))) crossings += 1;
    }
  }
  return crossings % 2 === 1;
}

export interface CheckedCell {
  readonly column: number;
  readonly row: number;
  readonly share: number;
  readonly centre: boolean;
}

/** Every cell whose rounded share is above 0 or whose centre is in, from the north, west to east. */
export function checkedCells(area: PlaneArea, spec: CellSpec): CheckedCell[] {
  const { widthMm: w, heightMm: h, originEastMm: ox, originNorthMm: oy } = spec;
  const numbers = area.polygons.flat(2);
  const xs = numbers.filter((_, i) => i % 2 === 0);
  const ys = numbers.filter((_, i) => i % 2 === 1);
  const [left, right] = [Math.floor((Math.min(...xs) - ox) / w), Math.ceil((Math.max(...xs) - ox) / w)];
  const [bottom, top] = [Math.floor((Math.min(...ys) - oy) / h), Math.ceil((Math.max(...ys) - oy) / h)];
  const cells: CheckedCell[] = [];
  for (let row = top - 1; row >= bottom; row -= 1) {
    const y = oy + row * h;
    const strips = area.polygons.map((polygon) =>
      polygon.map((ring) => clip(clip(cornersOf(ring), "y", y, true), "y", y + h, false)),
    );
    for (let column = left; column < right; column += 1) {
      const x = ox + column * w;
      let overlap = whole(0);
      strips.forEach((polygon) =>
        polygon.forEach((strip, index) => {
          const part = twiceArea(clip(clip(strip, "x", x, true), "x", x + w, false));
          overlap = index === 0 ? add(overlap, part) : subtract(overlap, part);
        }),
      );
      const cell = 2n * BigInt(w) * BigInt(h) * overlap.d;
      const share = Number((2n * overlap.n * 1_000_000_000n + cell) / (2n * cell));
      const centre = centreIsIn(area, x + w / 2, y + h / 2);
      if (share > 0 || centre) cells.push({ column, row, share, centre });
    }
  }
  return cells;
}
