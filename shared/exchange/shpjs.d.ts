/** The types that npm has for this package describe an older version and pull in Node's; this is the one function used. */
declare module "shpjs" {
  type ShapeGeometry =
    | { type: "Point"; coordinates: number[] }
    | { type: "MultiPoint"; coordinates: number[][] }
    | { type: "LineString"; coordinates: number[][] }
    | { type: "MultiLineString"; coordinates: number[][][] }
    | { type: "Polygon"; coordinates: number[][][] }
    | { type: "MultiPolygon"; coordinates: number[][][][] };
  /** Geometries of a .shp in its own coordinates, when no .prj is given; null for null shapes. */
  export function parseShp(shp: DataView): (ShapeGeometry | null)[];
}
