import { createHash } from "node:crypto";
import { ellipsoidArea } from "#shared/area/ellipsoid-area.ts";
import type { ImportedArea } from "#shared/area/imported-area.ts";
import { makePlaneRings } from "#shared/area/plane.ts";
import { areaOf, boundsOf, ringsToJson } from "#shared/geometry/rings.ts";
import type { PlaneArea } from "#shared/geometry/rings.ts";
import { crsFromEpsg, type Crs } from "#shared/projection/crs.ts";
import { transformer } from "#shared/projection/transformer.ts";
import { epsgLookup } from "./epsg.ts";
import type { JobResults, JobTasks } from "./tasks.ts";

/** A study area's rings on the plane of an EPSG code, in whole millimetres, as JSON that is stored as it is. */
export function makePlaneTask({ geometry, epsg }: JobTasks["make-plane"]): JobResults["make-plane"] {
  const source = JSON.parse(geometry) as ImportedArea;
  const crs = crsFromEpsg(epsg, epsgLookup);
  const { area, notes } = makePlaneRings(source, crs);
  const rings = JSON.stringify(ringsToJson(area));
  return {
    crsName: crs.name,
    crsText: crs.text,
    rings,
    ringsSha256: createHash("sha256").update(rings).digest("hex"),
    planeAreaSquareMetres: Number(areaOf(area).twiceMm2) / 2e6,
    geodesicAreaSquareMetres: ellipsoidArea(source),
    notes: crs.note === null ? [...notes] : [...notes, crs.note],
    net: netOver(area, crs),
  };
}

/** Plane metres with their longitude and latitude at 3 × 3 points over the area, from which maps draw their graticule. */
function netOver(area: PlaneArea, crs: Crs): [number, number, number, number][] {
  const { inverse } = transformer(crsFromEpsg(4326), crs);
  const { minX, minY, maxX, maxY } = boundsOf(area);
  const steps = [0, 0.5, 1];
  return steps.flatMap((up) =>
    steps.map((right): [number, number, number, number] => {
      const east = (minX + (maxX - minX) * right) / 1000;
      const north = (minY + (maxY - minY) * up) / 1000;
      const [lng, lat] = inverse([east, north]);
      return [east, north, lng, lat];
    }),
  );
}
