import { parseShp } from "shpjs";
import type { FoundLine, FoundPolygons, StatedCrs } from "#shared/area/found.ts";
import { askLayer, type AreaAnswers } from "#shared/area/questions.ts";
import { boundaryText } from "#shared/exchange/boundary-text.ts";
import { baseType, walkShapeRecords, type ShapeFileHeader } from "#shared/exchange/shapefile-records.ts";
import { unzipEntry, type ZipEntry } from "#shared/exchange/zip.ts";
import { Problem } from "#shared/problem.ts";
import { groupRings } from "#shared/area/group-rings.ts";
import type { Position } from "#shared/projection/transformer.ts";

type Geometry = ReturnType<typeof parseShp>[number];

/** Coordinates below this are the format's mark for "no data". */
const NO_DATA = -1e38;

/**
 * A zipped shapefile to polygons as they came, in the coordinates of the file: .shp needed, .prj says the system (asked when it
 * is missing), the rest is not needed. Several layers are asked for.
 * @throws Problem file-unknown without a .shp, file-damaged when cut short, area-question.
 */
export function readZippedShapefile(
  zip: Uint8Array,
  entries: readonly ZipEntry[],
  answers: AreaAnswers,
): FoundPolygons {
  const shapes = entries.filter(({ name }) => /\.shp$/i.test(name));
  const shape = chooseLayer(shapes, answers.layer);
  const layer = layerName(shape);
  const found = readShp(unzipEntry(zip, shape), layer);
  const sibling = (ending: string): ZipEntry | undefined =>
    entries.find(({ name }) => name.toLowerCase() === shape.name.toLowerCase().replace(/shp$/, ending));
  const prj = sibling("prj");
  const others = shapes.filter((other) => other !== shape).map(layerName);
  return {
    ...found,
    crs: statedCrs(prj === undefined ? null : boundaryText(unzipEntry(zip, prj)), layer),
    ignored: others.length === 0 ? [] : [`Other layers of the archive: ${others.join(", ")}.`],
  };
}

/** A .shp to polygons; parsed by shpjs and compared, record by record, with what the file's own headers state. */
export function readShp(shp: Uint8Array, layer: string): Omit<FoundPolygons, "crs"> {
  const header = walkShapeRecords(shp, layer);
  const geometries = parse(shp, header, layer);
  const polygons: Position[][][] = [];
  const lines: FoundLine[] = [];
  const others = { points: 0, empty: 0 };
  let heights = 0;
  geometries.forEach((geometry, index) => {
    const place = `Record ${index + 1} of “${layer}.shp”`;
    if (geometry === null) others.empty += 1;
    else if (geometry.type === "Point") others.points += 1;
    else if (geometry.type === "MultiPoint") others.points += geometry.coordinates.length;
    else if (geometry.type === "LineString" || geometry.type === "MultiLineString") {
      for (const line of geometry.type === "LineString" ? [geometry.coordinates] : geometry.coordinates)
        lines.push({ name: `line ${lines.length + 1}`, vertices: line.map((vertex) => position(vertex, place)) });
    } else {
      const rings = (geometry.type === "Polygon" ? [geometry.coordinates] : geometry.coordinates).map((polygon) =>
        polygon.map((ring) => ring.map((vertex) => position(vertex, place))),
      );
      compare(rings, header, index, place);
      if (header.shapeType > 10 && header.shapeType < 20) heights += header.records[index]?.points ?? 0;
      polygons.push(...groupRings(rings));
    }
  });
  return {
    format: "Shapefile",
    features: header.records.length,
    polygons,
    lines,
    others: { ...others, lines: lines.length },
    heights,
    mended: [],
    ignored: [],
    notes: [],
  };
}

function chooseLayer(shapes: readonly ZipEntry[], wanted: string | undefined): ZipEntry {
  const [first, second] = shapes;
  if (first === undefined) {
    throw new Problem(
      "file-unknown",
      "There is no .shp file in this zip archive. Put the .shp, .shx, .dbf and .prj of the boundary into it.",
    );
  }
  const chosen = shapes.find((shape) => layerName(shape) === wanted);
  if (chosen !== undefined) return chosen;
  if (second === undefined && wanted === undefined) return first;
  throw askLayer(shapes.map(layerName));
}

const layerName = (shape: ZipEntry): string => shape.name.replace(/\.shp$/i, "");

function parse(shp: Uint8Array, header: ShapeFileHeader, layer: string): readonly Geometry[] {
  let geometries: readonly Geometry[];
  try {
    geometries = parseShp(new DataView(shp.buffer, shp.byteOffset, shp.byteLength));
  } catch {
    throw new Problem(
      "file-damaged",
      `The shapes of “${layer}.shp” (kind ${header.shapeType}) cannot be read. Export the boundary as polygons.`,
    );
  }
  if (geometries.length !== header.records.length) {
    throw new Problem(
      "file-damaged",
      `“${layer}.shp” holds ${header.records.length} records, but only ${geometries.length} can be read. Export the shapefile again.`,
    );
  }
  return geometries;
}

/** The parser drops a hole that lies in no outer ring; the record's own counts show it. */
function compare(
  polygons: readonly (readonly (readonly Position[])[])[],
  header: ShapeFileHeader,
  index: number,
  place: string,
): void {
  const record = header.records[index];
  if (record === undefined || baseType(record.type) !== 5) throw new RangeError(`record ${index} is no polygon`);
  const rings = polygons.flat();
  const points = rings.reduce((sum, ring) => sum + ring.length, 0);
  if (rings.length !== record.parts || points !== record.points) {
    throw new Problem(
      "file-damaged",
      `${place} holds ${record.parts} rings, but ${record.parts - rings.length} of them lie in no outer ring or run the wrong way round. Check the holes of this polygon and export it again.`,
    );
  }
}

function position(vertex: readonly number[], place: string): Position {
  const [x, y] = vertex;
  if (x === undefined || y === undefined || !Number.isFinite(x) || !Number.isFinite(y) || x < NO_DATA || y < NO_DATA) {
    throw new Problem("file-damaged", `${place} has a vertex without usable coordinates. Export the shapefile again.`);
  }
  return [x, y];
}

function statedCrs(prj: string | null, layer: string): StatedCrs {
  if (prj === null || prj.trim() === "") {
    return {
      kind: "missing",
      why:
        prj === null
          ? `The shapefile “${layer}” comes without its .prj file.`
          : `The .prj file of “${layer}” is empty.`,
    };
  }
  return { kind: "stated", text: prj, howKnown: "the shapefile's own .prj file", byFile: true };
}
