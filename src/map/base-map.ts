import type { LngLat } from "#shared/units/metric.ts";
import type { LngLatOf } from "./planes.ts";
import type { PlaneBounds } from "./sheet-geometry.ts";
import type { SheetView } from "./sheet-context.ts";

/** One picture with its place on the sheet, in px from the view's anchor. */
export interface BaseMapTile {
  readonly key: string;
  readonly src: string;
  /** CSS transform of a picture of 256 px from the anchor to its place. */
  readonly transform: string;
}

/** Side of a picture in px. */
const SIDE = 256;
const FARTHEST_LATITUDE = 85.05;
/** Nearer than that most templates have nothing; their pictures are enlarged. */
const DEEPEST = 19;
const MOST_TILES = 120;
/** Ground px of a whole world in one picture at the equator: 2π · 6 378 137 m / 256. */
const METRES_A_PIXEL_AT_ZERO = 156_543.034;

type Point = readonly [number, number];

/** Column and row of a place at a zoom, with fractions (Web Mercator). */
function columnRow({ lng, lat }: LngLat, zoom: number): Point {
  const across = 2 ** zoom;
  const radians = (Math.min(FARTHEST_LATITUDE, Math.max(-FARTHEST_LATITUDE, lat)) * Math.PI) / 180;
  return [((lng + 180) / 360) * across, ((1 - Math.asinh(Math.tan(radians)) / Math.PI) / 2) * across];
}

function placeOf(column: number, row: number, zoom: number): LngLat {
  const across = 2 ** zoom;
  return {
    lng: (column / across) * 360 - 180,
    lat: (Math.atan(Math.sinh(Math.PI * (1 - (2 * row) / across))) * 180) / Math.PI,
  };
}

/** The way back from longitude and latitude to the plane, by Newton's method from the middle; good to a small part of a pixel. */
function planeFrom(lngLatOf: LngLatOf, middle: Point, stepMetres: number): (place: LngLat) => Point {
  return ({ lng, lat }) => {
    let [east, north] = middle;
    for (let i = 0; i < 5; i += 1) {
      const here = lngLatOf(east, north);
      const toEast = lngLatOf(east + stepMetres, north);
      const toNorth = lngLatOf(east, north + stepMetres);
      const [a, b] = [toEast.lng - here.lng, toNorth.lng - here.lng];
      const [c, d] = [toEast.lat - here.lat, toNorth.lat - here.lat];
      const determinant = a * d - b * c;
      if (determinant === 0) break;
      const [missLng, missLat] = [lng - here.lng, lat - here.lat];
      east += (stepMetres * (d * missLng - b * missLat)) / determinant;
      north += (stepMetres * (a * missLat - c * missLng)) / determinant;
    }
    return [east, north];
  };
}

/** The projective map of a square of 256 px to four corners (upper left, upper right, lower right, lower left) as CSS. */
export function squareTo([[x0, y0], [x1, y1], [x2, y2], [x3, y3]]: readonly [Point, Point, Point, Point]): string {
  const [dx1, dx2, sumX] = [x1 - x2, x3 - x2, x0 - x1 + x2 - x3];
  const [dy1, dy2, sumY] = [y1 - y2, y3 - y2, y0 - y1 + y2 - y3];
  const determinant = dx1 * dy2 - dx2 * dy1;
  const g = (sumX * dy2 - dx2 * sumY) / determinant;
  const h = (dx1 * sumY - sumX * dy1) / determinant;
  const values = [
    [(x1 - x0 + g * x1) / SIDE, (y1 - y0 + g * y1) / SIDE, 0, g / SIDE],
    [(x3 - x0 + h * x3) / SIDE, (y3 - y0 + h * y3) / SIDE, 0, h / SIDE],
    [0, 0, 1, 0],
    [x0, y0, 0, 1],
  ];
  return `matrix3d(${values.flat().map(Number).join(",")})`;
}

/** Pushed outwards by a part of a pixel, so that no paper shows between two pictures. */
function widened(corners: readonly [Point, Point, Point, Point]): [Point, Point, Point, Point] {
  const middleX = corners.reduce((sum, [x]) => sum + x, 0) / 4;
  const middleY = corners.reduce((sum, [, y]) => sum + y, 0) / 4;
  const widen = ([x, y]: Point): Point => [x + 0.4 * Math.sign(x - middleX), y + 0.4 * Math.sign(y - middleY)];
  return [widen(corners[0]), widen(corners[1]), widen(corners[2]), widen(corners[3])];
}

/** An address of the template: {s} is one of a, b, c; {r} asks for pictures of twice the px where the screen has them. */
export function addressOfTile(template: string, { x, y, z }: { x: number; y: number; z: number }): string {
  const values: Readonly<Record<string, string>> = {
    s: ["a", "b", "c"][Math.abs(x + y) % 3] ?? "a",
    x: String(x),
    y: String(y),
    z: String(z),
    r: globalThis.devicePixelRatio > 1 ? "@2x" : "",
  };
  return template.replace(/\{([sxyzr])\}/g, (_, name: string) => values[name] ?? "");
}

/** The zoom whose pictures are about as fine as the sheet. */
function zoomFor(scale: number, lat: number): number {
  const metresAPixel = METRES_A_PIXEL_AT_ZERO * Math.max(0.01, Math.cos((lat * Math.PI) / 180));
  return Math.min(DEEPEST, Math.max(0, Math.round(Math.log2(metresAPixel * scale))));
}

/** Columns and rows that touch what is in sight. */
function rangeOf({ west, east, south, north }: PlaneBounds, lngLatOf: LngLatOf, zoom: number) {
  const along = [0, 0.5, 1];
  const spots = along.flatMap((u) =>
    along.map((v) => columnRow(lngLatOf(west + u * (east - west), south + v * (north - south)), zoom)),
  );
  const last = 2 ** zoom - 1;
  const within = (value: number) => Math.min(last, Math.max(0, Math.floor(value)));
  return {
    left: within(Math.min(...spots.map(([column]) => column))),
    right: within(Math.max(...spots.map(([column]) => column))),
    top: within(Math.min(...spots.map(([, row]) => row))),
    bottom: within(Math.max(...spots.map(([, row]) => row))),
  };
}

/**
 * The pictures of a template (Web Mercator) that lie on what is in sight, each bent to the sheet's own plane by its four corners:
 * within one picture of a study area that is exact to a small part of a pixel. For looking only.
 */
export function baseMapTiles(template: string, view: SheetView, lngLatOf: LngLatOf): BaseMapTile[] {
  const { near, scale, anchorEast, anchorNorth } = view;
  const middle: Point = [(near.west + near.east) / 2, (near.south + near.north) / 2];
  let zoom = zoomFor(scale, lngLatOf(...middle).lat);
  let range = rangeOf(near, lngLatOf, zoom);
  const count = () => (range.right - range.left + 1) * (range.bottom - range.top + 1);
  while (count() > MOST_TILES && zoom > 0) {
    zoom -= 1;
    range = rangeOf(near, lngLatOf, zoom);
  }
  const planeOf = planeFrom(lngLatOf, middle, (near.east - near.west) / 100);
  const corner = (column: number, row: number): Point => {
    const [east, north] = planeOf(placeOf(column, row, zoom));
    return [(east - anchorEast) * scale, (anchorNorth - north) * scale];
  };
  const tiles: BaseMapTile[] = [];
  for (let y = range.top; y <= range.bottom; y += 1) {
    for (let x = range.left; x <= range.right; x += 1) {
      const corners = widened([corner(x, y), corner(x + 1, y), corner(x + 1, y + 1), corner(x, y + 1)]);
      tiles.push({
        key: `${zoom}/${x}/${y}`,
        src: addressOfTile(template, { x, y, z: zoom }),
        transform: squareTo(corners),
      });
    }
  }
  return tiles;
}
