import { findProperCrossing } from "#shared/area/crossings.ts";
import { ellipsoidArea } from "#shared/area/ellipsoid-area.ts";
import type { FoundPolygons } from "#shared/area/found.ts";
import type { ImportedArea } from "#shared/area/imported-area.ts";
import { mendRings } from "#shared/area/mend-rings.ts";
import { checkOverlaps } from "#shared/area/overlaps.ts";
import { checkPlausible, extentOf } from "#shared/area/plausible.ts";
import { askPlace } from "#shared/area/questions.ts";
import { onTheGlobe } from "#shared/area/world.ts";
import { Problem } from "#shared/problem.ts";
import type { Crs } from "#shared/projection/crs.ts";
import type { Bounds } from "#shared/projection/suggest.ts";
import { toWgs84 } from "#shared/projection/transformer.ts";
import type { SquareMetres } from "#shared/units/metric.ts";

export interface CheckedArea {
  readonly area: ImportedArea;
  readonly geodesicAreaM2: SquareMetres;
  readonly bounds: Bounds;
  readonly mended: readonly string[];
  readonly notes: readonly string[];
}

/** Less than this is no study area. */
const SMALLEST_M2 = 1;
/** More than this is most often a mistake of unit, and is told: 10,000 km². */
const LARGE_M2 = 1e10;

/**
 * All that must hold before polygons are a study area; what does not matter on the ground is mended and told, all else refused.
 * @throws Problem area-none, area-question, coordinates-swapped, rings-cross, parts-overlap, area-size.
 */
export function checkArea(found: FoundPolygons, crs: Crs): CheckedArea {
  if (found.polygons.length === 0) throw noArea(found);
  checkPlausible(extentOf(found.polygons), crs);
  const { polygons, mended } = mendRings(found.polygons, crs);
  if (polygons.length === 0)
    throw new Problem(
      "area-none",
      "All polygons of the file have fewer than three corners or no width. Draw the boundary again and import it.",
    );
  const area: ImportedArea = { crs, polygons };
  const { bounds } = onTheGlobe(area);
  refuseCrossings(area);
  checkOverlaps(area, bounds);
  const geodesicAreaM2 = ellipsoidArea(area);
  if (geodesicAreaM2 < SMALLEST_M2) {
    throw new Problem(
      "area-size",
      `The area is ${geodesicAreaM2.toPrecision(2)} m², less than one square metre. Check the unit and the coordinate reference system of the file.`,
    );
  }
  return { area, geodesicAreaM2, bounds, mended: [...found.mended, ...mended], notes: notesOn(area, geodesicAreaM2) };
}

function notesOn(area: ImportedArea, areaM2: SquareMetres): string[] {
  const notes: string[] = [];
  const parts = area.polygons.length;
  if (parts > 1) notes.push(`${parts} polygons taken together as one study area; edges that they share are dissolved.`);
  if (areaM2 > LARGE_M2) {
    notes.push(
      `The area is ${Math.round(areaM2 / 1e6).toLocaleString("en-GB")} km², which is very large for a study area: check the unit and the coordinate reference system.`,
    );
  }
  if (area.crs.note !== null) notes.push(area.crs.note);
  return notes;
}

function refuseCrossings(area: ImportedArea): void {
  const convert = toWgs84(area.crs);
  area.polygons.forEach((polygon, index) => {
    const crossing = findProperCrossing(polygon);
    if (crossing === null) return;
    const [lng, lat] = convert(crossing);
    const which = area.polygons.length === 1 ? "The boundary" : `The boundary of polygon ${index + 1}`;
    throw askPlace(
      "rings-cross",
      `${which} crosses itself at longitude ${lng.toFixed(6)}, latitude ${lat.toFixed(6)}. Move the corners apart there and import the file again.`,
      { lng, lat },
    );
  });
}

/** "Found 4 points, no area." */
function noArea({ others }: FoundPolygons): Problem {
  const kinds = [
    plural(others.points, "point"),
    plural(others.lines, "line"),
    plural(others.empty, "feature without a geometry", "features without a geometry"),
  ].filter((kind) => kind !== null);
  const found = kinds.length === 0 ? "The file holds no geometry at all." : `Found ${kinds.join(", ")}, and no area.`;
  const next =
    others.lines > 0
      ? "Close the line to a polygon in the program that it came from, and export it again."
      : "Draw the boundary as a polygon and export it again.";
  return new Problem("area-none", `${found} ${next}`);
}

const plural = (n: number, one: string, many = `${one}s`): string | null =>
  n === 0 ? null : `${n} ${n === 1 ? one : many}`;
