import type { ImportedArea } from "#shared/area/imported-area.ts";
import type { AreaAnswers } from "#shared/area/questions.ts";
import type { ImportReport } from "#shared/area/report.ts";
import type { EpsgLookup } from "#shared/projection/crs.ts";

export interface AreaFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

export interface AreaRead {
  readonly value: { readonly area: ImportedArea; readonly report: ImportReport };
  readonly notes: readonly string[];
}

/**
 * A boundary file (GeoJSON, zipped shapefile, KML) to a checked study area and its import report. Nothing is assumed: what the
 * file leaves open is asked by a Problem with a question (area/questions.ts), answered by calling again with `answers`.
 * Lives here, and not in area/, because it stands on the readers of exchange/.
 * @throws Problem file-*, area-*, rings-cross, parts-overlap, coordinates-swapped, crs-*.
 */
export function readArea(file: AreaFile, answers: AreaAnswers, tools: { readonly epsg?: EpsgLookup }): AreaRead {
  throw new RangeError(`not built yet: ${file.name} ${answers.layer ?? ""} ${typeof tools.epsg}`);
}
