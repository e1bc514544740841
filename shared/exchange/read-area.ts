import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex } from "@noble/hashes/utils.js";
import { checkArea, type CheckedArea } from "#shared/area/check.ts";
import { closeLines } from "#shared/area/close-lines.ts";
import type { FoundPolygons } from "#shared/area/found.ts";
import type { ImportedArea } from "#shared/area/imported-area.ts";
import { extentOf, magnitudeOf } from "#shared/area/plausible.ts";
import { askCrs, type AreaAnswers } from "#shared/area/questions.ts";
import { buildReport, type ImportReport } from "#shared/area/report.ts";
import { readBoundaryFile, type Readers } from "#shared/exchange/read-file.ts";
import { Problem } from "#shared/problem.ts";
import type { Position } from "#shared/projection/transformer.ts";
import { crsFromText, type Crs, type EpsgLookup } from "#shared/projection/crs.ts";

export interface AreaFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

export interface AreaRead {
  readonly value: { readonly area: ImportedArea; readonly report: ImportReport };
  readonly notes: readonly string[];
}

/**
 * A boundary file to a checked study area and its import report. Nothing is assumed: what the
 * file leaves open is asked by a Problem with a question (area/questions.ts), answered by calling again with `answers`.
 * Lives here, and not in area/, because it stands on the readers of exchange/.
 * @throws Problem file-*, area-*, rings-cross, parts-overlap, coordinates-swapped, crs-*.
 */
export function readArea(
  file: AreaFile,
  answers: AreaAnswers,
  tools: Readers & { readonly epsg?: EpsgLookup },
): AreaRead {
  const found = closeLines(oriented(readBoundaryFile(file.bytes, answers, tools), answers), answers);
  const { crs, howKnown, notes, checked } = settle(found, answers, tools.epsg);
  const source = { fileName: file.name, bytes: file.bytes.length, sha256: bytesToHex(sha256(file.bytes)) };
  const allNotes = [...found.notes, ...notes, ...checked.notes, ...areaOfUseNote(crs, checked, tools.epsg)];
  const report = buildReport({ found, checked, source, howKnown, notes: allNotes, answers });
  return { value: { area: checked.area, report }, notes: report.notes };
}

/** Coordinates the other way round, where somebody said that the file has them so. */
function oriented(found: FoundPolygons, { axes }: AreaAnswers): FoundPolygons {
  if (axes !== "exchanged") return found;
  const exchanged = (vertices: readonly Position[]): Position[] => vertices.map(([x, y]) => [y, x]);
  return {
    ...found,
    polygons: found.polygons.map((polygon) => polygon.map(exchanged)),
    lines: found.lines.map((line) => ({ ...line, vertices: exchanged(line.vertices) })),
    mended: [...found.mended, "Longitude and latitude were exchanged, as told at import."],
  };
}

interface Settled {
  readonly crs: Crs;
  readonly howKnown: string;
  readonly notes: readonly string[];
  readonly checked: CheckedArea;
}

/**
 * Which system holds. What the file itself says goes first; an answer is used where the file says nothing, cannot be converted,
 * or holds numbers that cannot be in the system it names.
 */
function settle(found: FoundPolygons, answers: AreaAnswers, epsg: EpsgLookup | undefined): Settled {
  const answered = answers.crs === undefined || answers.crs.trim() === "" ? null : answers.crs;
  const byAnswer = (why: string): Settled => {
    const crs = crsFromText(answered ?? "", epsg);
    return { crs, howKnown: `told at import${why}`, notes: [], checked: checkArea(found, crs) };
  };
  const stated = found.crs;
  if (stated.kind === "missing") {
    if (answered !== null) return byAnswer(", since the file does not say it");
    throw found.polygons.length === 0 ? noCrsNoArea(found) : askCrs(stated.why, magnitudeOf(extentOf(found.polygons)));
  }
  if (!stated.byFile && answered !== null) return byAnswer("");
  try {
    const crs = crsFromText(stated.text, epsg);
    const checked = checkArea(found, crs);
    const unused =
      answered === null || sameSystem(crs, answered, epsg)
        ? []
        : [`The file itself says ${crs.name}; the answer “${answered}” was not needed and not used.`];
    return { crs, howKnown: stated.howKnown, notes: unused, checked };
  } catch (error) {
    if (!(error instanceof Problem)) throw error;
    const about = error.code === "crs-unknown" || error.code === "crs-unsupported" || error.question?.kind === "crs";
    if (!about) throw error;
    if (answered !== null) return byAnswer(`, in place of what the file says (${error.message})`);
    throw error.question === undefined
      ? new Problem(error.code, error.message, askCrs(error.message, magnitudeOf(extentOf(found.polygons))).question)
      : error;
  }
}

/** A file without polygons is refused for that, whatever its system. */
function noCrsNoArea(found: FoundPolygons): Problem {
  try {
    checkArea(found, crsFromText("EPSG:4326"));
  } catch (error) {
    if (error instanceof Problem) return error;
    throw error;
  }
  throw new RangeError("a file without polygons passed for an area");
}

function sameSystem(crs: Crs, answer: string, epsg: EpsgLookup | undefined): boolean {
  try {
    const other = crsFromText(answer, epsg);
    return other.text === crs.text || (other.epsg !== null && other.epsg === crs.epsg);
  } catch (error) {
    if (error instanceof Problem) return false;
    throw error;
  }
}

/** A system used far from where it is made for is most often the wrong zone. */
function areaOfUseNote(crs: Crs, { bounds }: CheckedArea, epsg: EpsgLookup | undefined): string[] {
  const use = crs.epsg === null ? undefined : epsg?.(crs.epsg)?.bounds;
  if (use === undefined) return [];
  const [west, south, east, north] = use;
  const [lng, lat] = [(bounds[0] + bounds[2]) / 2, (bounds[1] + bounds[3]) / 2];
  const inside =
    lat >= south - 1 &&
    lat <= north + 1 &&
    (west <= east ? lng >= west - 1 && lng <= east + 1 : lng >= west - 1 || lng <= east + 1);
  return inside
    ? []
    : [`The area lies outside the place that ${crs.name} is made for. Look at the map: is it where it should be?`];
}
