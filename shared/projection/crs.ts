import { Problem } from "#shared/problem.ts";
import { builtInSystem } from "#shared/projection/built-in.ts";
import { inspectDefinition } from "#shared/projection/inspect.ts";

/** A coordinate reference system that this program can convert. Plain data: it is stored with areas and frames. */
export interface Crs {
  /** PROJ text or WKT1, the text that conversions use; the same text always gives the same plane. */
  readonly text: string;
  readonly epsg: number | null;
  readonly name: string;
  readonly kind: "geographic" | "projected";
  /** Metres in one unit of a projected system's coordinates; null where coordinates are degrees. */
  readonly metresPerUnit: number | null;
  /** What a reader should know about the conversion, such as a datum shift that is good to metres only. */
  readonly note: string | null;
}

/** One entry of the EPSG list as the injected look-up gives it. */
export interface EpsgEntry {
  readonly code: number;
  readonly name: string;
  readonly proj4: string;
  readonly wkt?: string | undefined;
  readonly kind: "geographic" | "projected" | "other";
  /** Area of use in degrees: west, south, east, north. */
  readonly bounds?: readonly [number, number, number, number] | undefined;
}

/** The EPSG list is large and lives on the server only; browsers do with the systems of built-in.ts. */
export type EpsgLookup = (code: number) => EpsgEntry | undefined;

const noLookup: EpsgLookup = () => undefined;

/**
 * The system that a text names: an EPSG code ("25831", "EPSG:25831", "urn:ogc:def:crs:EPSG::25831",
 * "http://www.opengis.net/def/crs/EPSG/0/25831"), the OGC's CRS84, a PROJ text, or WKT1 as in a .prj file.
 * @throws Problem crs-unknown when nothing is known under this text; crs-unsupported when converting would be silently wrong.
 */
export function crsFromText(text: string, lookup: EpsgLookup = noLookup): Crs {
  const cleaned = text.replace(/^\uFEFF/, "").trim();
  if (cleaned === "")
    throw new Problem("crs-unknown", "The name of the system is empty. Give an EPSG code, such as EPSG:25831.");
  if (/^(urn:ogc:def:crs:)?OGC:[^:]*:?CRS84$/i.test(cleaned) || /\/crs\/OGC\/[^/]+\/CRS84$/i.test(cleaned))
    return crsFromEpsg(4326, lookup);
  const code = codeIn(cleaned);
  if (code !== null) return crsFromEpsg(code, lookup);
  if (/^\+|\+proj=/.test(cleaned)) return crsFromDefinition(withOrigin(cleaned.replace(/\s+/g, " ")));
  if (/^(PROJCS|GEOGCS|COMPD_CS|PROJCRS|GEOGCRS|GEODCRS|GEODETICCRS|PROJECTEDCRS)\s*\[/i.test(cleaned))
    return crsFromWkt(cleaned, lookup);
  throw new Problem(
    "crs-unknown",
    `“${shorten(cleaned)}” names no system that is known here. Give an EPSG code, such as EPSG:25831.`,
  );
}

/** The system of an EPSG code. @throws Problem crs-unknown, crs-unsupported as crsFromText. */
export function crsFromEpsg(code: number, lookup: EpsgLookup = noLookup): Crs {
  const entry = builtInSystem(code) ?? lookup(code);
  if (entry === undefined) {
    throw new Problem(
      "crs-unknown",
      `EPSG:${code} is not in the list of systems. Check the number, or give the system as a PROJ text.`,
    );
  }
  if (entry.kind === "other") {
    throw new Problem(
      "crs-unsupported",
      `EPSG:${code} (${entry.name}) is neither a map projection nor longitude and latitude. Give one of these.`,
    );
  }
  return inspectDefinition({ text: entry.proj4, epsg: code, name: entry.name, bounds: entry.bounds });
}

/** @throws Problem crs-unsupported unless the system is projected and in metres, which a frame needs. */
export function checkFrameCrs(crs: Crs): Crs {
  if (crs.kind !== "projected") {
    throw new Problem(
      "crs-unsupported",
      `${crs.name} is in degrees, and cells are measured in metres. Choose a projected system, such as the UTM zone of the place.`,
    );
  }
  if (crs.metresPerUnit !== 1) {
    throw new Problem(
      "crs-unsupported",
      `${crs.name} is not in metres (one unit is ${crs.metresPerUnit ?? 0} m). A frame needs metres: choose the UTM zone of the place, for example.`,
    );
  }
  return crs;
}

/** The EPSG code that a text is or names, or null. */
function codeIn(text: string): number | null {
  const match =
    /^(?:EPSG\s*:{1,2}\s*)?(\d{4,6})$/i.exec(text) ??
    /^urn:(?:ogc|x-ogc):def:crs:EPSG:[^:]*:(\d{4,6})$/i.exec(text) ??
    /\/(?:crs\/EPSG\/[^/]+\/|epsg\.xml#)(\d{4,6})$/i.exec(text);
  return match?.[1] === undefined ? null : Number(match[1]);
}

/** PROJ takes a missing false origin as zero; the converter here wants it written. */
function withOrigin(text: string): string {
  const missing = ["+x_0", "+y_0"].filter((key) => !text.includes(key));
  return /\+proj=(longlat|latlong|utm)\b/.test(text) ? text : [text, ...missing.map((key) => `${key}=0`)].join(" ");
}

function crsFromDefinition(text: string): Crs {
  const title = /\+title=(.*?)(?=\s\+|$)/.exec(text)?.[1];
  const projection = /\+proj=(\S+)/.exec(text)?.[1] ?? "unknown projection";
  return inspectDefinition({ text, epsg: null, name: title ?? `system given as PROJ text (${projection})` });
}

/** A WKT with an EPSG code of its own is taken by that code where the list has it, since the list states the datum shift. */
function crsFromWkt(wkt: string, lookup: EpsgLookup): Crs {
  const text = wkt.replace(/\s*[\r\n]+\s*/g, "").trim();
  const name = /^\w+\s*\[\s*"([^"]*)"/.exec(text)?.[1]?.replaceAll("_", " ") ?? "unnamed system";
  const authority = /AUTHORITY\s*\[\s*"EPSG"\s*,\s*"?(\d{4,6})"?\s*\]\s*\]\s*$/i.exec(text)?.[1];
  const entry = authority === undefined ? undefined : (builtInSystem(Number(authority)) ?? lookup(Number(authority)));
  if (entry !== undefined && entry.kind !== "other")
    return inspectDefinition({ text: entry.proj4, epsg: entry.code, name: entry.name });
  return inspectDefinition({ text, epsg: null, name });
}

const shorten = (text: string): string => (text.length <= 60 ? text : `${text.slice(0, 60)}…`);
