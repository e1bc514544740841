import { Problem } from "#shared/problem.ts";

/** One record of a .shp as its own headers describe it, to compare with what a parser made of it. */
interface ShapeRecord {
  readonly type: number;
  readonly parts: number;
  readonly points: number;
}

export interface ShapeFileHeader {
  readonly shapeType: number;
  readonly records: readonly ShapeRecord[];
}

const FILE_CODE = 9994;
const HEADER_BYTES = 100;

/** Kinds of shapes by their base number: 0 none, 1 point, 3 line, 5 polygon, 8 points; + 10 with heights, + 20 with measures. */
export const baseType = (type: number): number => (type > 20 ? type - 20 : type > 10 ? type - 10 : type);

/**
 * Walks a .shp record by record (ESRI Shapefile Technical Description, July 1998): the file is as long as its header says, each
 * record fits, is of the file's type or null, and holds the parts and points that it states.
 * @throws Problem file-damaged when anything is cut short or does not add up: never half an area.
 */
export function walkShapeRecords(shp: Uint8Array, layer: string): ShapeFileHeader {
  const view = new DataView(shp.buffer, shp.byteOffset, shp.byteLength);
  if (shp.length < HEADER_BYTES || view.getInt32(0) !== FILE_CODE) throw damaged(layer, "is not a .shp file");
  const stated = view.getInt32(24) * 2;
  if (stated > shp.length)
    throw damaged(layer, `is cut short: it says that it is ${stated} bytes long and has ${shp.length}`);
  const shapeType = view.getInt32(32, true);
  const records: ShapeRecord[] = [];
  let at = HEADER_BYTES;
  while (at + 8 <= stated) {
    const length = view.getInt32(at + 4) * 2;
    const place = `record ${records.length + 1}`;
    if (length < 4 || at + 8 + length > stated) throw damaged(layer, `is cut short or damaged at ${place}`);
    records.push(readRecord(view, at + 8, length, shapeType, `${place} of “${layer}.shp”`));
    at += 8 + length;
  }
  if (at !== stated) throw damaged(layer, `has ${stated - at} bytes too many at its end`);
  return { shapeType, records };
}

function readRecord(view: DataView, at: number, length: number, shapeType: number, place: string): ShapeRecord {
  const type = view.getInt32(at, true);
  if (type === 0) return { type, parts: 0, points: 0 };
  if (type !== shapeType)
    throw new Problem(
      "file-damaged",
      `The kind of shape in ${place} is ${type} where the file says ${shapeType}. Export the shapefile again.`,
    );
  const base = baseType(type);
  if (base !== 3 && base !== 5) return { type, parts: 0, points: 0 };
  if (length < 44)
    throw new Problem("file-damaged", `The ${place} is too short for its shape. Export the shapefile again.`);
  const parts = view.getInt32(at + 36, true);
  const points = view.getInt32(at + 40, true);
  const needed = 44 + parts * 4 + points * 16 + (type > 10 && type < 20 ? 16 + points * 8 : 0);
  if (parts < 0 || points < 0 || needed > length) {
    throw new Problem(
      "file-damaged",
      `The ${place} says that it holds ${points} points in ${parts} parts, which do not fit into it. Export the shapefile again.`,
    );
  }
  for (let part = 0, previous = -1; part < parts; part++) {
    const first = view.getInt32(at + 44 + part * 4, true);
    if (first <= previous || first >= points || (part === 0 && first !== 0)) {
      throw new Problem("file-damaged", `The parts of ${place} do not follow one another. Export the shapefile again.`);
    }
    previous = first;
  }
  return { type, parts, points };
}

const damaged = (layer: string, what: string): Problem =>
  new Problem("file-damaged", `“${layer}.shp” ${what}. Nothing was read; export the shapefile again.`);
