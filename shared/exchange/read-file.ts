import type { FoundPolygons } from "#shared/area/found.ts";
import { askLayer, type AreaAnswers } from "#shared/area/questions.ts";
import { boundaryText } from "#shared/exchange/boundary-text.ts";
import { readGeoJson } from "#shared/exchange/geojson.ts";
import { readGpx } from "#shared/exchange/read-gpx.ts";
import { readKml } from "#shared/exchange/kml.ts";
import { looksLikeWkt, readWkt } from "#shared/exchange/read-wkt.ts";
import { readZippedShapefile } from "#shared/exchange/shapefile.ts";
import { listZip, unzipEntry, type ZipEntry } from "#shared/exchange/zip.ts";
import { Problem } from "#shared/problem.ts";

const KINDS_READ = "Boundaries are read from GeoJSON, a zipped shapefile, KML, KMZ, GeoPackage, GPX or WKT.";

/** Files that people choose by mistake, by their first bytes, and what to do instead. */
const SIGNATURES: readonly { start: readonly number[]; what: string; next?: string }[] = [
  { start: [0x89, 0x50, 0x4e, 0x47], what: "an image (PNG)" },
  { start: [0xff, 0xd8, 0xff], what: "an image (JPEG)" },
  { start: [0x47, 0x49, 0x46, 0x38], what: "an image (GIF)" },
  { start: [0x49, 0x49, 0x2a, 0x00], what: "an image (TIFF)" },
  { start: [0x4d, 0x4d, 0x00, 0x2a], what: "an image (TIFF)" },
  { start: [0x52, 0x49, 0x46, 0x46], what: "an image, sound or film (RIFF)" },
  {
    start: [0x25, 0x50, 0x44, 0x46],
    what: "a PDF",
    next: "A map in a PDF cannot be read; ask for the boundary as a geodata file.",
  },
  { start: [0x1f, 0x8b], what: "a gzip archive", next: "Unpack it and choose the boundary file in it." },
  {
    start: [0x37, 0x7a, 0xbc, 0xaf],
    what: "a 7z archive",
    next: "Unpack it and choose the boundary file in it, or make a zip archive.",
  },
  {
    start: [0x52, 0x61, 0x72, 0x21],
    what: "a RAR archive",
    next: "Unpack it and choose the boundary file in it, or make a zip archive.",
  },
  { start: [0xd0, 0xcf, 0x11, 0xe0], what: "an old office document" },
  {
    start: [0x00, 0x00, 0x27, 0x0a],
    what: "a .shp or .shx by itself",
    next: "Put the .shp, .shx, .dbf and .prj into one zip archive and choose that.",
  },
];

/** "SQLite" */
const SQLITE = [0x53, 0x51, 0x4c, 0x69, 0x74, 0x65];

/** Readers that need more than a browser has. */
export interface Readers {
  readonly geoPackage?: (bytes: Uint8Array, answers: AreaAnswers) => FoundPolygons;
}

/**
 * Reads a boundary file by what is in it, whatever its name.
 * @throws Problem file-empty; file-unknown that names what was found; and what the readers throw.
 */
export function readBoundaryFile(bytes: Uint8Array, answers: AreaAnswers, readers: Readers = {}): FoundPolygons {
  if (bytes.length === 0) throw new Problem("file-empty", "This file is empty. Nothing was changed.");
  const signature = SIGNATURES.find(({ start }) => start.every((byte, i) => bytes[i] === byte));
  if (signature !== undefined) throw unknown(signature.what, signature.next);
  if (SQLITE.every((byte, i) => bytes[i] === byte)) {
    if (readers.geoPackage !== undefined) return readers.geoPackage(bytes, answers);
    throw unknown("a database (SQLite or GeoPackage)", "Here it cannot be opened: export the boundary as GeoJSON.");
  }
  if (bytes[0] === 0x50 && bytes[1] === 0x4b) return readArchive(bytes, answers);
  return readText(bytes);
}

function readArchive(bytes: Uint8Array, answers: AreaAnswers): FoundPolygons {
  const entries = listZip(bytes);
  if (entries.length === 0) throw unknown("a zip archive with nothing in it");
  if (entries.some(({ name }) => /\.shp$/i.test(name))) return readZippedShapefile(bytes, entries, answers);
  const document = entries.find(({ name }) => /^(word|xl|ppt)\//.test(name) || name === "mimetype");
  if (document !== undefined) throw unknown(`an office document (${officeKind(document.name)})`);
  const kmls = entries.filter(({ name }) => /\.kml$/i.test(name));
  if (kmls.length > 0) return readKmz(bytes, kmls, answers);
  const inside = entries.find(({ name }) => /\.(geojson|json|gpkg)$/i.test(name));
  if (inside !== undefined)
    throw unknown(
      `a zip archive with “${inside.name}” and no shapefile in it`,
      `Unpack it and choose the boundary file itself.`,
    );
  return readZippedShapefile(bytes, entries, answers);
}

/** A KMZ is a zip archive of a KML with its pictures; several KML files in it are asked for. */
function readKmz(bytes: Uint8Array, kmls: readonly ZipEntry[], answers: AreaAnswers): FoundPolygons {
  const names = kmls.map(({ name }) => name);
  const chosen = kmls.find(({ name }) => name === answers.layer) ?? (kmls.length === 1 ? kmls[0] : undefined);
  if (chosen === undefined) throw askLayer(names);
  const found = readKml(boundaryText(unzipEntry(bytes, chosen)));
  const others = names.filter((name) => name !== chosen.name);
  return {
    ...found,
    format: "KMZ",
    ignored: [...found.ignored, ...(others.length === 0 ? [] : [`Other files of the archive: ${others.join(", ")}.`])],
  };
}

const officeKind = (name: string): string =>
  name.startsWith("word/")
    ? "text"
    : name.startsWith("xl/")
      ? "spreadsheet"
      : name.startsWith("ppt/")
        ? "slides"
        : "OpenDocument or e-book";

function readText(bytes: Uint8Array): FoundPolygons {
  if (bytes.includes(0) && !isUtf16(bytes)) throw unknown("not text, and of no kind that is known here");
  const text = boundaryText(bytes);
  const start = text.trimStart().slice(0, 2000);
  if (start === "") throw new Problem("file-empty", "This file holds nothing but blanks. Nothing was changed.");
  if (start.startsWith("{") || start.startsWith("[")) return readGeoJson(text);
  if (/^<(!doctype html|html)/i.test(start))
    throw unknown("a web page (HTML)", "Perhaps it is the page that a download should have come from.");
  if (/<(\w+:)?gpx[\s>]/i.test(start)) return readGpx(text);
  if (start.startsWith("<")) return readKml(text);
  if (looksLikeWkt(start)) return readWkt(text);
  throw unknown(`plain text, beginning “${start.split(/\r?\n/)[0]?.slice(0, 40) ?? ""}”`);
}

const isUtf16 = (bytes: Uint8Array): boolean =>
  (bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff);

const unknown = (what: string, next?: string): Problem =>
  new Problem("file-unknown", `This is ${what}. ${KINDS_READ}${next === undefined ? "" : ` ${next}`}`);
