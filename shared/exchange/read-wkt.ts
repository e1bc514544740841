import { wktToGeoJSON } from "betterknown";
import type { FoundPolygons, StatedCrs } from "#shared/area/found.ts";
import { readGeoJson } from "#shared/exchange/geojson.ts";
import { Problem } from "#shared/problem.ts";

const GEOMETRY =
  /^(?:SRID\s*=\s*(\d{1,9})\s*;)?\s*((?:MULTI)?(?:POLYGON|LINESTRING|POINT)|GEOMETRYCOLLECTION)\s*(?:ZM|Z|M)?\s*(?:\(|EMPTY)/i;

/** Whether a text begins as well-known text does. */
export const looksLikeWkt = (text: string): boolean => GEOMETRY.test(text.trimStart());

/**
 * Well-known text (OGC Simple Features 1.2.1), or the extended kind that begins with `SRID=25832;`, to polygons as they
 * came; several geometries, one after another or a line each, are taken together. Without an SRID the system is asked. The
 * parser from npm stops at the end of the first geometry and overlooks what is no number; so the text is cut into its
 * geometries here, and numbers are checked afterwards.
 * @throws Problem file-damaged that names the geometry; crs-unknown where two geometries say different systems.
 */
export function readWkt(text: string): FoundPolygons {
  const pieces = piecesOf(text);
  const features = pieces.map(({ wkt, where }) => ({ type: "Feature", properties: {}, geometry: parse(wkt, where) }));
  const found = readGeoJson(JSON.stringify({ type: "FeatureCollection", features }));
  return { ...found, format: "WKT", crs: statedCrs(pieces.map(({ srid }) => srid)) };
}

interface Piece {
  readonly wkt: string;
  readonly srid: string | null;
  readonly where: string;
}

/** The geometries of a text: each ends with the bracket that closes its first, or with EMPTY. */
function piecesOf(text: string): Piece[] {
  const pieces: Piece[] = [];
  let rest = text.trim();
  while (rest !== "") {
    const where = `Geometry ${pieces.length + 1}`;
    const start = GEOMETRY.exec(rest);
    if (start === null) throw damaged(`${where} begins with “${rest.slice(0, 40)}”`);
    const end = endOf(rest, start[0].length);
    if (end === null) throw damaged(`${where} breaks off: a bracket is not closed`);
    const srid = start[1] ?? null;
    pieces.push({ wkt: rest.slice(0, end).replace(/^SRID[^;]*;/i, ""), srid, where });
    rest = rest.slice(end).replace(/^[\s;,]+/, "");
  }
  return pieces;
}

function endOf(text: string, afterStart: number): number | null {
  if (text[afterStart - 1] !== "(") return afterStart;
  let depth = 1;
  for (let at = afterStart; at < text.length; at++) {
    if (text[at] === "(") depth += 1;
    else if (text[at] === ")") depth -= 1;
    if (depth === 0) return at + 1;
  }
  return null;
}

function parse(wkt: string, where: string): unknown {
  try {
    return wktToGeoJSON(wkt.trim());
  } catch (error) {
    throw damaged(`${where}: ${error instanceof Error ? error.message : "not readable"}`);
  }
}

function statedCrs(srids: readonly (string | null)[]): StatedCrs {
  const named = [...new Set(srids)];
  const [srid] = named;
  if (named.length > 1) {
    const list = named.map((one) => one ?? "none").join(" and ");
    throw new Problem("crs-unknown", `Geometries of this text say different systems: SRID ${list}. Keep one of them.`);
  }
  if (srid === undefined || srid === null || srid === "0") {
    return { kind: "missing", why: "Well-known text does not say which system it is in." };
  }
  return { kind: "stated", text: `EPSG:${srid}`, howKnown: `the text's own SRID (${srid})`, byFile: true };
}

const damaged = (what: string): Problem =>
  new Problem("file-damaged", `The well-known text cannot be read. ${what}. Export it again, or save it as GeoJSON.`);
