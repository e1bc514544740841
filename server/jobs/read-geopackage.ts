import wkx from "wkx";
import type { FoundPolygons, StatedCrs } from "#shared/area/found.ts";
import { askLayer, type AreaAnswers } from "#shared/area/questions.ts";
import { readGeoJson } from "#shared/exchange/geojson.ts";
import { Problem } from "#shared/problem.ts";
import { type FeatureLayer, type GeoPackageFile, openGeoPackage } from "../db/geopackage-file.ts";

/**
 * The features of a GeoPackage to polygons as they came; several layers are asked for. The file is untrusted: it is opened in
 * memory, checked, read only, and only plain tables are looked at.
 * @throws Problem file-unknown without a layer of features, file-damaged, area-question
 */
export function readGeoPackage(bytes: Uint8Array, answers: AreaAnswers): FoundPolygons {
  const file = open(bytes);
  try {
    const layer = chosen(file.layers, answers.layer);
    const features = [...file.geometries(layer)].map((blob, index) => ({
      type: "Feature",
      properties: {},
      geometry: blob === null ? null : geometryOf(blob, `Feature ${index + 1} of “${layer.name}”`),
    }));
    const found = readGeoJson(JSON.stringify({ type: "FeatureCollection", features }));
    const others = file.layers.filter(({ name }) => name !== layer.name).map(({ name }) => name);
    return {
      ...found,
      format: "GeoPackage",
      crs: statedCrs(layer),
      ignored: others.length === 0 ? [] : [`Other layers of the file: ${others.join(", ")}.`],
    };
  } finally {
    file.close();
  }
}

function open(bytes: Uint8Array): GeoPackageFile {
  try {
    return openGeoPackage(bytes);
  } catch (error) {
    const message = error instanceof Error ? error.message : "";
    if (message.includes("no such table")) {
      throw new Problem(
        "file-unknown",
        "This is a SQLite database, but no GeoPackage. Export the boundary as GeoJSON.",
      );
    }
    throw new Problem("file-damaged", `The GeoPackage cannot be read (${message}). Export it again.`);
  }
}

function chosen(layers: readonly FeatureLayer[], wanted: string | undefined): FeatureLayer {
  const [first, second] = layers;
  if (first === undefined) {
    throw new Problem("area-none", "The GeoPackage holds no layer of features. Export the boundary again as polygons.");
  }
  const found = layers.find(({ name }) => name === wanted) ?? (second === undefined ? first : undefined);
  if (found === undefined) throw askLayer(layers.map(({ name }) => name));
  return found;
}

const ENVELOPE_BYTES = [0, 32, 48, 48, 64];

/** A GeoPackage geometry (OGC 12-128, 2.1.3: "GP", version, flags, SRS, envelope, then WKB) as GeoJSON; empty ones as null. */
function geometryOf(blob: Uint8Array, where: string): unknown {
  const flags = blob[3] ?? 0;
  const envelope = ENVELOPE_BYTES[(flags >> 1) & 0b111];
  const isExtended = (flags & 0b100000) !== 0;
  if (blob[0] !== 0x47 || blob[1] !== 0x50 || envelope === undefined)
    throw damaged(where, "its geometry has no header");
  if (isExtended) throw damaged(where, "its geometry is of an extended kind");
  if ((flags & 0b10000) !== 0) return null;
  try {
    return wkx.Geometry.parse(Buffer.from(blob).subarray(8 + envelope)).toGeoJSON();
  } catch (error) {
    throw damaged(where, error instanceof Error ? error.message : "its geometry cannot be read");
  }
}

function damaged(where: string, what: string): Problem {
  return new Problem("file-damaged", `${where} cannot be read: ${what}. Export the boundary as plain polygons.`);
}

function statedCrs({ name, system }: FeatureLayer): StatedCrs {
  if (system === null) return { kind: "missing", why: `The layer “${name}” does not say which system it is in.` };
  const { organization, code, definition } = system;
  const howKnown = `the GeoPackage's own table of systems (${organization} ${code})`;
  const text = organization.toUpperCase() === "EPSG" ? `EPSG:${code}` : definition;
  return { kind: "stated", text, howKnown, byFile: true };
}
