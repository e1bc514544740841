import { visitEdges, type EdgeIndex } from "./edge-index.ts";
import { turn } from "./turn.ts";

/** Calls `visit` with every edge that a ray from the middle of an edge to the west crosses, that edge itself left out. */
export function visitCrossedWest(
  ends: Float64Array,
  index: EdgeIndex,
  from: number,
  visit: (edge: number) => void,
): void {
  // Doubled coordinates keep the middle whole.
  const x = (ends[4 * from] ?? 0) + (ends[4 * from + 2] ?? 0);
  const y = (ends[4 * from + 1] ?? 0) + (ends[4 * from + 3] ?? 0);
  visitEdges(index, -Infinity, y / 2, x / 2, y / 2, (edge) => {
    if (edge === from) return;
    const x1 = 2 * (ends[4 * edge] ?? 0);
    const y1 = 2 * (ends[4 * edge + 1] ?? 0);
    const x2 = 2 * (ends[4 * edge + 2] ?? 0);
    const y2 = 2 * (ends[4 * edge + 3] ?? 0);
    if (y1 <= y === y2 <= y) return;
    const side = y1 < y2 ? turn(x1, y1, x2, y2, x, y) : turn(x2, y2, x1, y1, x, y);
    if (side < 0) visit(edge);
  });
}
