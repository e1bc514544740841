import type { GridPoint } from "#shared/units/metric.ts";
import { CornerNumbers } from "./corner-numbers.ts";
import type { Ring, Segment } from "./rings.ts";
import { turn } from "./turn.ts";

/** A ring's passing of a corner: where it comes from and where it goes to. */
interface Passing {
  readonly x: number;
  readonly y: number;
  readonly fromX: number;
  readonly fromY: number;
  readonly toX: number;
  readonly toY: number;
}

/**
 * Two passings of one corner by edges that don't overlap cross if and only if exactly one end of the second lies in the sector from
 * the first's way out, counter-clockwise, to its way in.
 */
export function segmentsThatCrossAtCorners(
  rings: readonly Ring[],
): { readonly a: Segment; readonly b: Segment; readonly at: GridPoint } | null {
  for (const passings of sharedCorners(rings)) {
    for (const [i, a] of passings.entries()) {
      const b = passings
        .slice(i + 1)
        .find((other) => inSector(a, other.fromX, other.fromY) !== inSector(a, other.toX, other.toY));
      if (b !== undefined) return { a: wayIn(a), b: wayIn(b), at: { eastMm: a.x, northMm: a.y } };
    }
  }
  return null;
}

const wayIn = ({ fromX, fromY, x, y }: Passing): Segment => ({ fromX, fromY, toX: x, toY: y });

/** Corners that rings pass more than once. */
function sharedCorners(rings: readonly Ring[]): Passing[][] {
  const corners = new CornerNumbers(rings.reduce((sum, ring) => sum + ring.length / 2, 0));
  const first: Passing[] = [];
  const shared = new Map<number, Passing[]>();
  for (const ring of rings) {
    const { length } = ring;
    for (let i = 0; i < length; i += 2) {
      const passing: Passing = {
        x: ring[i] ?? 0,
        y: ring[i + 1] ?? 0,
        fromX: ring[(i + length - 2) % length] ?? 0,
        fromY: ring[(i + length - 1) % length] ?? 0,
        toX: ring[(i + 2) % length] ?? 0,
        toY: ring[(i + 3) % length] ?? 0,
      };
      const corner = corners.numberOf(passing.x, passing.y);
      const before = first[corner];
      if (before === undefined) first[corner] = passing;
      else shared.set(corner, [...(shared.get(corner) ?? [before]), passing]);
    }
  }
  return [...shared.values()];
}

/** Whether a direction lies counter-clockwise between a passing's way out and its way in. */
function inSector({ x, y, fromX, fromY, toX, toY }: Passing, pointX: number, pointY: number): boolean {
  const leftOfOut = turn(x, y, toX, toY, pointX, pointY) > 0;
  const rightOfIn = turn(x, y, fromX, fromY, pointX, pointY) < 0;
  return turn(x, y, toX, toY, fromX, fromY) >= 0 ? leftOfOut && rightOfIn : leftOfOut || rightOfIn;
}
