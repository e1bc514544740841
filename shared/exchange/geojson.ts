import type { FoundLine, FoundPolygons, StatedCrs } from "#shared/area/found.ts";
import { Problem } from "#shared/problem.ts";
import type { Position } from "#shared/projection/transformer.ts";

const MAX_DEPTH = 30;
const LONGEST_NAME = 100;
const GEOMETRIES = [
  "Point",
  "MultiPoint",
  "LineString",
  "MultiLineString",
  "Polygon",
  "MultiPolygon",
  "GeometryCollection",
];

type Json = Readonly<Record<string, unknown>>;

interface Tally {
  polygons: Position[][][];
  lines: FoundLine[];
  features: number;
  points: number;
  empty: number;
  heights: number;
}

/**
 * GeoJSON (RFC 7946, and the older `crs` member) to polygons as they came: FeatureCollection, Feature, or a bare geometry,
 * collections within. Heights, points, lines and empty geometries are counted, not used.
 * @throws Problem file-damaged, with the line of bad JSON or the feature that is not GeoJSON.
 */
export function readGeoJson(text: string): FoundPolygons {
  const root = parseJson(text);
  if (!isObject(root) || typeof root["type"] !== "string") {
    throw new Problem(
      "file-damaged",
      "This is JSON but not GeoJSON: it has no “type”. Export the boundary as GeoJSON.",
    );
  }
  const tally: Tally = { polygons: [], lines: [], features: 0, points: 0, empty: 0, heights: 0 };
  readRoot(root, tally);
  return {
    format: "GeoJSON",
    crs: statedCrs(root),
    features: tally.features,
    polygons: tally.polygons,
    lines: tally.lines,
    others: { points: tally.points, lines: tally.lines.length, empty: tally.empty },
    heights: tally.heights,
    mended: [],
    ignored: [],
    notes: [],
  };
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch (error) {
    const message = error instanceof Error ? error.message : "";
    throw new Problem(
      "file-damaged",
      `The file is not valid JSON${placeOf(message, text)}. It may be cut short; export it again.`,
    );
  }
}

/** Engines tell the place as a position or as line and column, in the words of their message. */
function placeOf(message: string, text: string): string {
  const line = /line (\d+) column (\d+)/.exec(message);
  if (line !== null) return `: it breaks at line ${line[1] ?? ""}, column ${line[2] ?? ""}`;
  const position = /position (\d+)/.exec(message)?.[1];
  if (position === undefined) return `: it breaks off at its end, line ${text.split("\n").length}`;
  const before = text.slice(0, Number(position)).split("\n");
  return `: it breaks at line ${before.length}, column ${(before.at(-1)?.length ?? 0) + 1}`;
}

function readRoot(root: Json, tally: Tally): void {
  if (root["type"] === "FeatureCollection") {
    const features = root["features"];
    if (!Array.isArray(features))
      throw new Problem("file-damaged", "The FeatureCollection has no list of features. Export the boundary again.");
    features.forEach((feature: unknown, index) => readFeature(feature, `Feature ${index + 1}`, tally));
  } else if (root["type"] === "Feature") {
    readFeature(root, "The feature", tally);
  } else {
    tally.features = 1;
    readGeometry(root, "The geometry", "", tally, 0);
  }
}

function readFeature(feature: unknown, where: string, tally: Tally): void {
  if (!isObject(feature)) throw new Problem("file-damaged", `${where} is not an object. Export the boundary again.`);
  tally.features += 1;
  if (feature["type"] === "Feature") readGeometry(feature["geometry"] ?? null, where, nameOf(feature), tally, 0);
  else if (typeof feature["type"] === "string" && GEOMETRIES.includes(feature["type"]))
    readGeometry(feature, where, "", tally, 0);
  else
    throw new Problem(
      "file-damaged",
      `${where} is not a GeoJSON feature: its “type” is missing or other. Export the boundary again.`,
    );
}

function readGeometry(geometry: unknown, where: string, name: string, tally: Tally, depth: number): void {
  if (geometry === null) {
    tally.empty += 1;
    return;
  }
  if (!isObject(geometry))
    throw new Problem("file-damaged", `${where} has a geometry that is not an object. Export the boundary again.`);
  const coordinates = geometry["coordinates"];
  switch (geometry["type"]) {
    case "Polygon":
      addPolygon(coordinates, where, tally);
      return;
    case "MultiPolygon":
      for (const polygon of list(coordinates, where)) addPolygon(polygon, where, tally);
      return;
    case "GeometryCollection": {
      if (depth >= MAX_DEPTH)
        throw new Problem(
          "file-unsafe",
          `${where} nests collections more than ${MAX_DEPTH} deep. Export the boundary as plain polygons.`,
        );
      for (const member of list(geometry["geometries"], where)) readGeometry(member, where, name, tally, depth + 1);
      return;
    }
    case "Point":
      tally.points += 1;
      return;
    case "MultiPoint":
      tally.points += list(coordinates, where).length;
      return;
    case "LineString":
      addLine(coordinates, where, name, tally);
      return;
    case "MultiLineString":
      for (const line of list(coordinates, where)) addLine(line, where, name, tally);
      return;
    default:
      throw new Problem("file-damaged", `${where} is of no kind that GeoJSON knows. Export the boundary again.`);
  }
}

/** What people see a feature called. */
function nameOf(feature: Json): string {
  const properties = feature["properties"];
  const name = isObject(properties) ? (properties["name"] ?? properties["Name"]) : undefined;
  return typeof name === "string" ? name.trim().slice(0, LONGEST_NAME) : "";
}

function addLine(coordinates: unknown, where: string, name: string, tally: Tally): void {
  const vertices = list(coordinates, where).map((vertex) => position(vertex, where, tally));
  tally.lines.push({ name: name === "" ? `line ${tally.lines.length + 1}` : name, vertices });
}

function addPolygon(coordinates: unknown, where: string, tally: Tally): void {
  const rings = list(coordinates, where).map((ring) =>
    list(ring, where).map((vertex) => position(vertex, where, tally)),
  );
  const filled = rings.filter((ring) => ring.length > 0);
  if (filled.length === 0) tally.empty += 1;
  else tally.polygons.push(filled);
}

function position(vertex: unknown, where: string, tally: Tally): Position {
  const [x, y] = Array.isArray(vertex) ? (vertex as unknown[]) : [];
  if (typeof x !== "number" || typeof y !== "number" || !Number.isFinite(x) || !Number.isFinite(y)) {
    throw new Problem(
      "file-damaged",
      `${where} has a vertex that is not two numbers: ${JSON.stringify(vertex).slice(0, 80)}. Export the boundary again.`,
    );
  }
  if (Array.isArray(vertex) && vertex.length > 2) tally.heights += 1;
  return [x, y];
}

function list(value: unknown, where: string): readonly unknown[] {
  if (!Array.isArray(value))
    throw new Problem("file-damaged", `${where} has coordinates that are not a list. Export the boundary again.`);
  return value;
}

/** RFC 7946: longitude and latitude of WGS 84 unless the older `crs` member says otherwise; a null or linked one says nothing. */
function statedCrs(root: Json): StatedCrs {
  if (!("crs" in root)) {
    return {
      kind: "stated",
      text: "EPSG:4326",
      howKnown: "GeoJSON is in longitude and latitude of WGS 84 (RFC 7946)",
      byFile: false,
    };
  }
  const crs = root["crs"];
  const properties = isObject(crs) && crs["type"] === "name" ? crs["properties"] : undefined;
  const name = isObject(properties) ? properties["name"] : undefined;
  if (typeof name === "string")
    return { kind: "stated", text: name, howKnown: `the file's own “crs” member (${name})`, byFile: true };
  return {
    kind: "missing",
    why:
      crs === null
        ? "The file says that its coordinate reference system is not known."
        : "The file's “crs” member does not name a system.",
  };
}

const isObject = (value: unknown): value is Json =>
  typeof value === "object" && value !== null && !Array.isArray(value);
