import { outlineForMap } from "#shared/area/outline.ts";
import { suggestFrameCrs } from "#shared/projection/suggest.ts";
import { readArea } from "#shared/exchange/read-area.ts";
import { epsgLookup } from "./epsg.ts";
import { readGeoPackage } from "./read-geopackage.ts";
import type { JobResults, JobTasks } from "./tasks.ts";

/** A boundary file → geometry in its own system, report, outline for maps, systems proposed for the frame. */
export function readAreaTask({ name, bytes, answers }: JobTasks["read-area"]): JobResults["read-area"] {
  const { value } = readArea({ name, bytes }, answers, { epsg: epsgLookup, geoPackage: readGeoPackage });
  const outline = outlineForMap(value.area);
  return {
    geometry: JSON.stringify({ format: "quillet-area/1", ...value.area }),
    report: value.report,
    outline: outline.polygons,
    outlineSimplified: outline.simplified,
    suggestedCrs: suggestFrameCrs(value.report.bounds),
  };
}
