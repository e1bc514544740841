type Ring = readonly (readonly [number, number])[];

/** A .shp of polygon records (each a list of closed rings; null for a null shape), by the format's published description. */
export function makeShp(records: readonly (readonly Ring[] | null)[], shapeType = 5): Uint8Array {
  const bodies = records.map((rings) => (rings === null ? nullBody() : polygonBody(rings, shapeType)));
  const length = 100 + bodies.reduce((sum, body) => sum + 8 + body.byteLength, 0);
  const view = new DataView(new ArrayBuffer(length));
  view.setInt32(0, 9994);
  view.setInt32(24, length / 2);
  view.setInt32(28, 1000, true);
  view.setInt32(32, shapeType, true);
  let at = 100;
  bodies.forEach((body, i) => {
    view.setInt32(at, i + 1);
    view.setInt32(at + 4, body.byteLength / 2);
    new Uint8Array(view.buffer).set(new Uint8Array(body.buffer), at + 8);
    at += 8 + body.byteLength;
  });
  return new Uint8Array(view.buffer);
}

function nullBody(): DataView {
  return new DataView(new ArrayBuffer(4));
}

function polygonBody(rings: readonly Ring[], shapeType: number): DataView {
  const points = rings.flat();
  const view = new DataView(new ArrayBuffer(44 + 4 * rings.length + 16 * points.length));
  view.setInt32(0, shapeType, true);
  view.setInt32(36, rings.length, true);
  view.setInt32(40, points.length, true);
  let first = 0;
  rings.forEach((ring, i) => {
    view.setInt32(44 + 4 * i, first, true);
    first += ring.length;
  });
  points.forEach(([x, y], i) => {
    view.setFloat64(44 + 4 * rings.length + 16 * i, x, true);
    view.setFloat64(52 + 4 * rings.length + 16 * i, y, true);
  });
  return view;
}

/** A closed rectangle, clockwise as outer rings of shapefiles are, or counter-clockwise as their holes. */
export function rectangle(
  west: number,
  south: number,
  east: number,
  north: number,
  clockwise = true,
): [number, number][] {
  const ring: [number, number][] = [
    [west, south],
    [west, north],
    [east, north],
    [east, south],
    [west, south],
  ];
  return clockwise ? ring : ring.toReversed();
}
