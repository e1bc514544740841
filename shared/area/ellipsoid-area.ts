import type { ImportedArea, SourceRing } from "#shared/area/imported-area.ts";
import { areaOnEllipsoid, type EdgePath } from "#shared/projection/geodesic.ts";
import { toWgs84, type Position } from "#shared/projection/transformer.ts";
import { squareMetres, type SquareMetres } from "#shared/units/metric.ts";

/** Area on the WGS 84 ellipsoid in m²: outer rings minus holes, edges straight in the source system (R1). */
export function ellipsoidArea(area: ImportedArea): SquareMetres {
  const convert = toWgs84(area.crs);
  let total = 0;
  for (const polygon of area.polygons) {
    polygon.forEach((ring, index) => {
      const size = Math.abs(areaOnEllipsoid(edgePaths(ring, convert)));
      total += index === 0 ? size : -size;
    });
  }
  return squareMetres(total);
}

function* edgePaths(ring: SourceRing, convert: (position: Position) => Position): Generator<EdgePath> {
  for (const [i, from] of ring.entries()) {
    const to = ring[(i + 1) % ring.length] ?? from;
    yield (t) => convert([from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])]);
  }
}
