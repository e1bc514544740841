import { createHash } from "node:crypto";
import { writeCsv } from "#shared/exchange/csv.ts";
import { writeGpx } from "#shared/exchange/gpx.ts";
import type { CellSpec } from "#shared/frame/cell-spec.ts";
import { cellCentre, cellCorners } from "#shared/frame/list.ts";
import { crsFromText } from "#shared/projection/crs.ts";
import { toWgs84 } from "#shared/projection/transformer.ts";
import { type GridPoint, WHOLE_CELL } from "#shared/units/metric.ts";

/** One cell to visit, under the name that its waypoint has. */
export interface WaypointCell {
  readonly name: string;
  readonly unit: number;
  readonly label: string;
  readonly column: number;
  readonly row: number;
  readonly shareBillionths: number;
  /** Positions in the draw, in draw order. */
  readonly orders: readonly number[];
  readonly assignedTo: { readonly name: string; readonly day: string } | null;
}

export interface WaypointsTask {
  readonly format: "gpx" | "csv";
  readonly cells: readonly WaypointCell[];
  readonly spec: CellSpec;
  readonly crs: { readonly name: string; readonly text: string };
  readonly title: string;
  readonly at: string;
  /** The newest event: its hash on the file is a witness outside the database. */
  readonly newest: { readonly sequence: number; readonly sha256: string } | null;
}

export interface WrittenWaypoints {
  readonly text: string;
  readonly sha256: string;
}

/** A place on the frame's plane in metres, and on the globe in WGS 84 degrees. */
interface Place {
  readonly eastM: number;
  readonly northM: number;
  readonly lng: number;
  readonly lat: number;
}

const MILLIMETRES_PER_METRE = 1000;
/** About a centimetre. */
const DEGREE_DECIMALS = 7;
/** Whole millimetres. */
const METRE_DECIMALS = 3;
const SHARE_DECIMALS = 9;
const CORNERS = ["sw", "se", "ne", "nw"] as const;

/** The file of the cells to visit, and its hash. */
export function writeWaypoints(task: WaypointsTask): WrittenWaypoints {
  const placeOf = placesOn(task.crs.text);
  const text = task.format === "gpx" ? waypointsGpx(task, placeOf) : waypointsCsv(task, placeOf);
  return { text, sha256: createHash("sha256").update(text).digest("hex") };
}

type PlaceOf = (point: GridPoint) => Place;

function placesOn(crsText: string): PlaceOf {
  const onGlobe = toWgs84(crsFromText(crsText));
  return ({ eastMm, northMm }) => {
    const [eastM, northM] = [eastMm / MILLIMETRES_PER_METRE, northMm / MILLIMETRES_PER_METRE];
    const [lng, lat] = onGlobe([eastM, northM]);
    return { eastM, northM, lng, lat };
  };
}

/** Waypoints of the centres as GPX 1.1. */
function waypointsGpx({ cells, spec, crs, title, at, newest }: WaypointsTask, placeOf: PlaceOf): string {
  const waypoints = cells.map((cell) => {
    const { lng, lat, eastM, northM } = placeOf(cellCentre(spec, cell));
    return {
      lng,
      lat,
      name: cell.name,
      comment: `${cell.label} ${picksInWords(cell.orders)}`,
      description: `Cell ${cell.label}, unit ${cell.unit}, ${picksInWords(cell.orders)}. Centre E ${eastM.toFixed(METRE_DECIMALS)} N ${northM.toFixed(METRE_DECIMALS)} m, ${crs.name}.`,
      symbol: "Flag, Red",
    };
  });
  const witness = newest ? `record event ${newest.sequence}, ${newest.sha256}` : "";
  const description = [`${cells.length} cells to visit`, witness].filter((part) => part !== "").join("; ");
  return writeGpx(waypoints, { name: title, description, time: at }).value;
}

const HEADER = [
  "name",
  "unit",
  "label",
  "draw_orders",
  "repeats",
  "share_inside",
  "assigned_to",
  "day",
  ...["centre", ...CORNERS].flatMap((place) =>
    ["longitude", "latitude", "east_m", "north_m"].map((axis) => `${place}_${axis}`),
  ),
  "record_event",
  "record_sha256",
];

/** The same cells as a table: centre and corners in longitude and latitude (WGS 84) and in the frame's own metres. */
function waypointsCsv({ cells, spec, newest }: WaypointsTask, placeOf: PlaceOf): string {
  const rows = cells.map((cell) => [
    cell.name,
    cell.unit,
    cell.label,
    cell.orders.join(" "),
    cell.orders.length,
    (cell.shareBillionths / WHOLE_CELL).toFixed(SHARE_DECIMALS),
    cell.assignedTo?.name ?? null,
    cell.assignedTo?.day ?? null,
    ...[cellCentre(spec, cell), ...cellCorners(spec, cell)].flatMap((point) => coordinates(placeOf(point))),
    newest?.sequence ?? null,
    newest?.sha256 ?? null,
  ]);
  return writeCsv(HEADER, rows);
}

function coordinates({ lng, lat, eastM, northM }: Place): string[] {
  return [
    lng.toFixed(DEGREE_DECIMALS),
    lat.toFixed(DEGREE_DECIMALS),
    eastM.toFixed(METRE_DECIMALS),
    northM.toFixed(METRE_DECIMALS),
  ];
}

function picksInWords(orders: readonly number[]): string {
  if (orders.length === 1) return `pick ${orders.join("")}`;
  return `picks ${orders.join(" and ")} (×${orders.length})`;
}
