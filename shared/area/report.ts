import type { CheckedArea } from "#shared/area/check.ts";
import type { FoundPolygons } from "#shared/area/found.ts";
import type { AreaAnswers } from "#shared/area/questions.ts";

/** What an import found, mended and left aside; kept with the file for ever. The same shape as importReport of the API. */
export interface ImportReport {
  format: string;
  fileName: string;
  bytes: number;
  /** SHA-256 of the file as it came, in lower-case hexadecimal. */
  sha256: string;
  crs: { name: string; epsg: number | null; text: string; howKnown: string };
  features: number;
  /** Polygons taken. */
  parts: number;
  rings: number;
  holes: number;
  /** Vertices of all rings, without repeated last ones. */
  vertices: number;
  /** On the WGS 84 ellipsoid, with edges straight in the source system. */
  geodesicAreaM2: number;
  /** West, south, east, north in WGS 84 degrees. */
  bounds: [number, number, number, number];
  mended: string[];
  ignored: string[];
  notes: string[];
  /** What people answered beside the system, so that the file can be read again alike; left out where nothing was asked. */
  answers?: Omit<AreaAnswers, "crs">;
}

export interface ReportInput {
  readonly found: FoundPolygons;
  readonly checked: CheckedArea;
  readonly source: { readonly fileName: string; readonly bytes: number; readonly sha256: string };
  readonly howKnown: string;
  readonly notes: readonly string[];
  readonly answers: AreaAnswers;
}

/** Puts an import's facts together; counts are of what was taken, after mending. */
export function buildReport({ found, checked, source, howKnown, notes, answers }: ReportInput): ImportReport {
  const { crs, polygons } = checked.area;
  const rings = polygons.flat();
  const [west, south, east, north] = checked.bounds;
  return {
    format: found.format,
    ...source,
    crs: { name: crs.name, epsg: crs.epsg, text: crs.text, howKnown },
    features: found.features,
    parts: polygons.length,
    rings: rings.length,
    holes: rings.length - polygons.length,
    vertices: rings.reduce((sum, ring) => sum + ring.length, 0),
    geodesicAreaM2: checked.geodesicAreaM2,
    bounds: [west, south, east, north],
    mended: [...checked.mended],
    ignored: [...found.ignored, ...leftAside(found)],
    notes: [...notes],
    ...answered(answers),
  };
}

function answered({ layer, lines, axes }: AreaAnswers): Pick<ImportReport, "answers"> {
  const given = {
    ...(layer === undefined ? {} : { layer }),
    ...(lines === undefined ? {} : { lines }),
    ...(axes === undefined ? {} : { axes }),
  };
  return Object.keys(given).length === 0 ? {} : { answers: given };
}

function leftAside({ others, heights }: FoundPolygons): string[] {
  const told: string[] = [];
  if (others.points > 0) told.push(`${others.points} ${others.points === 1 ? "point" : "points"}, which are no area.`);
  if (others.lines > 0) told.push(`${others.lines} ${others.lines === 1 ? "line" : "lines"}, which are no area.`);
  if (others.empty > 0) told.push(`${others.empty} ${others.empty === 1 ? "feature" : "features"} without a geometry.`);
  if (heights > 0) told.push(`The heights of ${heights} ${heights === 1 ? "vertex" : "vertices"}.`);
  return told;
}
