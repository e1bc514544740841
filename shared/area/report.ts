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
}
