import { indexEdges, visitEdges } from "./edge-index.ts";
import { writeEdge, type EdgeSet } from "./edge-set.ts";
import { noCuts, type Cuts } from "./meetings.ts";
import { turn } from "./turn.ts";

const MOST_BOXES = 2_000_000;

/**
 * Snap rounding (Hobby 1999): every whole-millimetre place with an end or a rounded crossing is *hot*, and each edge is bent to
 * the middle of every hot square millimetre [x − ½, x + ½) × [y − ½, y + ½) that it passes through. Edges then meet at hot places only, and
 * none moves by more than 0.71 mm.
 */
export function snapCuts(edges: EdgeSet, rounded: readonly number[]): Cuts {
  const { count, ends } = edges;
  const cuts = noCuts();
  // One search a hot place: the more there are, the smaller the boxes may be.
  const index = indexEdges(edges, count + Math.min(rounded.length, MOST_BOXES));
  if (index === null) return cuts;
  const hot = new Map<number, Set<number>>();
  const heat = (x: number, y: number): void => {
    const column = hot.get(x) ?? new Set<number>();
    hot.set(x, column);
    if (column.has(y)) return;
    column.add(y);
    visitEdges(index, x - 1, y - 1, x + 1, y + 1, (edge) => {
      if (!passesThrough(ends, edge, x, y)) return;
      cuts.edge.push(edge);
      cuts.x.push(x);
      cuts.y.push(y);
    });
  };
  for (let end = 0; end < 2 * count; end += 1) heat(ends[2 * end] ?? 0, ends[2 * end + 1] ?? 0);
  for (let i = 0; i < rounded.length; i += 2) heat(rounded[i] ?? 0, rounded[i + 1] ?? 0);
  return cuts;
}

/**
 * Whether an edge passes through the half-open square millimetre around (x, y), other than by one of its ends. All is doubled, so that
 * corners are whole. Ends are middles of squares; so where the square's middle is in the edge's box and its line has corners on
 * both sides, the edge itself passes. A line that only touches passes at the lower left corner, the one that belongs to the square.
 */
function passesThrough(ends: Float64Array, edge: number, x: number, y: number): boolean {
  const x1 = ends[4 * edge] ?? 0;
  const y1 = ends[4 * edge + 1] ?? 0;
  const x2 = ends[4 * edge + 2] ?? 0;
  const y2 = ends[4 * edge + 3] ?? 0;
  if ((x === x1 && y === y1) || (x === x2 && y === y2)) return false;
  const low = Math.min(y1, y2);
  if (x < x1 || x > x2 || y < low || y > Math.max(y1, y2)) return false;
  const side = (cornerX: number, cornerY: number): number => turn(2 * x1, 2 * y1, 2 * x2, 2 * y2, cornerX, cornerY);
  const lowerLeft = side(2 * x - 1, 2 * y - 1);
  const others = [side(2 * x + 1, 2 * y - 1), side(2 * x - 1, 2 * y + 1), side(2 * x + 1, 2 * y + 1)];
  const isLeft = lowerLeft > 0 || others.some((corner) => corner > 0);
  const isRight = lowerLeft < 0 || others.some((corner) => corner < 0);
  if (isLeft && isRight) return true;
  return lowerLeft === 0 && x1 < x && low < y;
}

/** Replaces edges by their parts between cuts. Cuts of an edge lie along it, both coordinates never turning back. */
export function cutEdges({ count, ends }: EdgeSet, cuts: Cuts): EdgeSet {
  const order = Int32Array.from({ length: cuts.edge.length }, (_, index) => index);
  const along = (cutIndex: number): number => {
    const edge = cuts.edge[cutIndex] ?? 0;
    const rises = (ends[4 * edge + 3] ?? 0) >= (ends[4 * edge + 1] ?? 0);
    return (cuts.x[cutIndex] ?? 0) + (rises ? 1 : -1) * (cuts.y[cutIndex] ?? 0);
  };
  order.sort((a, b) => (cuts.edge[a] ?? 0) - (cuts.edge[b] ?? 0) || along(a) - along(b));
  const parts = new Float64Array(4 * (count + order.length));
  let size = 0;
  let next = 0;
  for (let edge = 0; edge < count; edge += 1) {
    let x = ends[4 * edge] ?? 0;
    let y = ends[4 * edge + 1] ?? 0;
    const goOn = (toX: number, toY: number): void => {
      if (toX === x && toY === y) return;
      writeEdge(parts, size, x, y, toX, toY);
      size += 1;
      x = toX;
      y = toY;
    };
    for (; next < order.length && cuts.edge[order[next] ?? 0] === edge; next += 1) {
      goOn(cuts.x[order[next] ?? 0] ?? 0, cuts.y[order[next] ?? 0] ?? 0);
    }
    goOn(ends[4 * edge + 2] ?? 0, ends[4 * edge + 3] ?? 0);
  }
  return { count: size, ends: parts.slice(0, 4 * size) };
}
