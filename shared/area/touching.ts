import Flatbush from "flatbush";
import type { ImportedArea, SourcePolygon, SourceRing } from "#shared/area/imported-area.ts";
import { distanceToEdge, metresPerUnitAt } from "#shared/area/scale.ts";
import type { Crs } from "#shared/projection/crs.ts";
import type { Position } from "#shared/projection/transformer.ts";

/** A vertex this near to an edge of another ring lies on it. Half a millimetre moves nothing that rounding does not move. */
const TOUCH_METRES = 0.0005;

/**
 * Gives an edge the vertices of other rings that lie on it. Neighbouring polygons often share a border of which one has more
 * vertices than the other; projected, the long edge and the short ones would part by up to 5 mm and leave slivers between.
 */
export function splitAtTouchingVertices(area: ImportedArea): readonly SourcePolygon[] {
  const rings = area.polygons.flat();
  if (rings.length < 2) return area.polygons;
  const vertices = rings.flat();
  const index = new Flatbush(vertices.length);
  for (const [x, y] of vertices) index.add(x, y);
  index.finish();
  return area.polygons.map((polygon) => polygon.map((ring) => splitRing(ring, vertices, index, area.crs)));
}

function splitRing(ring: SourceRing, vertices: readonly Position[], index: Flatbush, crs: Crs): SourceRing {
  return ring.flatMap((from, i) => {
    const to = ring[(i + 1) % ring.length] ?? from;
    const scale = metresPerUnitAt(crs, from);
    const [marginX, marginY] = [TOUCH_METRES / scale[0], TOUCH_METRES / scale[1]];
    const near = index.search(
      Math.min(from[0], to[0]) - marginX,
      Math.min(from[1], to[1]) - marginY,
      Math.max(from[0], to[0]) + marginX,
      Math.max(from[1], to[1]) + marginY,
    );
    const on: { along: number; vertex: Position }[] = [];
    for (const found of near) {
      const vertex = vertices[found];
      if (vertex === undefined || isNear(vertex, from, scale) || isNear(vertex, to, scale)) continue;
      const { metres, along } = distanceToEdge(vertex, from, to, scale);
      if (metres <= TOUCH_METRES) on.push({ along, vertex });
    }
    on.sort((a, b) => a.along - b.along);
    return [
      from,
      ...on
        .map(({ vertex }) => vertex)
        .filter((vertex, k, all) => k === 0 || !isNear(vertex, all[k - 1] ?? vertex, scale)),
    ];
  });
}

const isNear = (a: Position, b: Position, scale: Position): boolean =>
  Math.hypot((a[0] - b[0]) * scale[0], (a[1] - b[1]) * scale[1]) <= TOUCH_METRES;
