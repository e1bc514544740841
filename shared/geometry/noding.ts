import type { GridPoint } from "#shared/units/metric.ts";
import { assemble } from "./assemble.ts";
import { indexEdges, visitPairs } from "./edge-index.ts";
import { edgesOf, oddEdges, ringsOf, type EdgeSet } from "./edge-set.ts";
import { meet, noCuts } from "./meetings.ts";
import { segmentsThatCrossAtCorners } from "./corner-crossings.ts";
import type { PlaneArea, Ring, Segment } from "./rings.ts";
import { cutEdges, snapCuts } from "./snap.ts";

/** Snapping settles in two or three rounds; more than this is a bug, not an input. */
const MOST_ROUNDS = 64;

/**
 * Rings in whole millimetres → the area that they hold under the even–odd rule, noded (rule R1): edges meet at their ends only, by an
 * exact test. Equal edges cancel in pairs, so areas that touch along an edge become one. Where no two edges cross, nothing moves and
 * corners are only added where an end touches another edge; a crossing off the millimetre grid is snapped, and no edge moves by more
 * than a millimetre a round. The result has one form, whatever the order, start and direction of the rings that went in.
 * An area that vanishes gives no polygons.
 */
export function nodeRings(rings: readonly Ring[]): PlaneArea {
  let edges = oddEdges(edgesOf(rings));
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    const index = indexEdges(edges);
    if (index === null) return { polygons: [] };
    const cuts = noCuts();
    const { ends } = edges;
    visitPairs(index, (a, b) => {
      meet(ends, a, b, cuts);
      return false;
    });
    if (cuts.edge.length === 0 && cuts.rounded.length === 0) return assemble(edges, index);
    edges = oddEdges(cutEdges(edges, cuts.rounded.length === 0 ? cuts : snapCuts(edges, cuts.rounded)));
  }
  throw new RangeError(`rings with ${edges.count} edges still cross after ${MOST_ROUNDS} rounds`);
}

/** Two edges that meet other than at an end of both, or rings that cross at a corner. */
export interface Crossing {
  readonly a: Segment;
  readonly b: Segment;
  /** Where, rounded to whole millimetres. */
  readonly at: GridPoint;
}

/**
 * The exact test that sealing and replay run: the first pair of edges that cross, overlap or touch other than at ends of both, or
 * that belong to rings crossing each other at a corner; null where there is none.
 */
export function findCrossing(area: PlaneArea): Crossing | null {
  const rings = ringsOf(area.polygons);
  const edges = edgesOf(rings);
  const index = indexEdges(edges);
  if (index === null) return null;
  const { ends } = edges;
  const found: Crossing[] = [];
  visitPairs(index, (a, b) => {
    const at = meetingPlace(ends, a, b);
    if (at !== null) found.push({ a: segmentOf(edges, a), b: segmentOf(edges, b), at });
    return at !== null;
  });
  return found[0] ?? segmentsThatCrossAtCorners(rings);
}

function meetingPlace(ends: Float64Array, a: number, b: number): GridPoint | null {
  if ([0, 1, 2, 3].every((i) => ends[4 * a + i] === ends[4 * b + i])) {
    return { eastMm: ends[4 * a] ?? 0, northMm: ends[4 * a + 1] ?? 0 };
  }
  const cuts = noCuts();
  if (!meet(ends, a, b, cuts)) return null;
  return { eastMm: cuts.x[0] ?? cuts.rounded[0] ?? 0, northMm: cuts.y[0] ?? cuts.rounded[1] ?? 0 };
}

function segmentOf({ ends }: EdgeSet, edge: number): Segment {
  return {
    fromX: ends[4 * edge] ?? 0,
    fromY: ends[4 * edge + 1] ?? 0,
    toX: ends[4 * edge + 2] ?? 0,
    toY: ends[4 * edge + 3] ?? 0,
  };
}
