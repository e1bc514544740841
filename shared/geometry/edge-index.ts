import Flatbush from "flatbush";
import type { EdgeSet } from "./edge-set.ts";

/** Finds edges by place. Long slanted edges are indexed in several boxes, so that boxes stay small. */
export interface EdgeIndex {
  readonly tree: Flatbush;
  /** The edge of each box. */
  readonly owner: Int32Array;
  /** minX, minY, maxX, maxY of each box. */
  readonly boxes: Float64Array;
  /** By edge: the last search that met it, so that an edge with several boxes is visited once. */
  readonly met: Uint32Array;
  searches: number;
}

/** How slanted an edge is: the smaller side of its box, in mm. Level and upright edges have none. */
function slant(ends: Float64Array, edge: number): number {
  const deltaX = (ends[4 * edge + 2] ?? 0) - (ends[4 * edge] ?? 0);
  const deltaY = Math.abs((ends[4 * edge + 3] ?? 0) - (ends[4 * edge + 1] ?? 0));
  return Math.min(deltaX, deltaY);
}

/**
 * The index of edges, in at most `wanted` boxes more than there are edges. Null where there are no edges.
 */
export function indexEdges({ count, ends }: EdgeSet, wanted = count): EdgeIndex | null {
  if (count === 0) return null;
  let slants = 0;
  for (let edge = 0; edge < count; edge += 1) slants += slant(ends, edge);
  const step = Math.max(1, slants / wanted);
  const parts = Int32Array.from({ length: count }, (_, edge) => Math.max(1, Math.ceil(slant(ends, edge) / step)));
  const total = parts.reduce((sum, part) => sum + part, 0);
  const tree = new Flatbush(total);
  const owner = new Int32Array(total);
  const boxes = new Float64Array(4 * total);
  let at = 0;
  parts.forEach((number, edge) => {
    for (let part = 0; part < number; part += 1) {
      writeBox(boxes, at, ends, edge, part / number, (part + 1) / number);
      tree.add(boxes[4 * at] ?? 0, boxes[4 * at + 1] ?? 0, boxes[4 * at + 2] ?? 0, boxes[4 * at + 3] ?? 0);
      owner[at] = edge;
      at += 1;
    }
  });
  tree.finish();
  return { tree, owner, boxes, met: new Uint32Array(count), searches: 0 };
}

/** The box of an edge between two fractions of its length, a millimetre wider where that is rounded. */
function writeBox(boxes: Float64Array, at: number, ends: Float64Array, edge: number, from: number, to: number): void {
  const x1 = ends[4 * edge] ?? 0;
  const y1 = ends[4 * edge + 1] ?? 0;
  const x2 = ends[4 * edge + 2] ?? 0;
  const y2 = ends[4 * edge + 3] ?? 0;
  const wider = from === 0 && to === 1 ? 0 : 1;
  const startY = y1 + (y2 - y1) * from;
  const endY = y1 + (y2 - y1) * to;
  boxes[4 * at] = x1 + (x2 - x1) * from - wider;
  boxes[4 * at + 1] = Math.min(startY, endY) - wider;
  boxes[4 * at + 2] = x1 + (x2 - x1) * to + wider;
  boxes[4 * at + 3] = Math.max(startY, endY) + wider;
}

/** Calls `visit` with every two edges whose boxes touch; a pair may come more than once. Stops when `visit` gives true. */
export function visitPairs(index: EdgeIndex, visit: (a: number, b: number) => boolean): void {
  const { tree, owner, boxes } = index;
  const state = { stop: false };
  for (let box = 0; box < owner.length && !state.stop; box += 1) {
    const a = owner[box] ?? 0;
    tree.search(
      boxes[4 * box] ?? 0,
      boxes[4 * box + 1] ?? 0,
      boxes[4 * box + 2] ?? 0,
      boxes[4 * box + 3] ?? 0,
      (other) => {
        const b = owner[other] ?? 0;
        if (!state.stop && other > box && a !== b) state.stop = visit(a, b);
        return false;
      },
    );
  }
}

/** Calls `visit` once with each edge that has a box touching the given one. */
export function visitEdges(
  index: EdgeIndex,
  minX: number,
  minY: number,
  maxX: number,
  maxY: number,
  visit: (edge: number) => void,
): void {
  const { tree, owner, met } = index;
  index.searches += 1;
  const search = index.searches;
  tree.search(minX, minY, maxX, maxY, (box) => {
    const edge = owner[box] ?? 0;
    if (met[edge] !== search) {
      met[edge] = search;
      visit(edge);
    }
    return false;
  });
}
