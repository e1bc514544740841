import { writeCsv } from "#shared/exchange/csv.ts";
import { writeGpx } from "#shared/exchange/gpx.ts";
import { WHOLE_CELL } from "#shared/units/metric.ts";
import type { FramePlaces, Place } from "./frame-places.ts";
import type { VisitView } from "./read-visits.ts";

export interface NamedVisit {
  readonly view: VisitView;
  readonly name: string;
}

interface About {
  readonly title: string;
  readonly at: string;
  /** The newest event: its hash on the file is a witness outside the database. */
  readonly newest: { readonly sequence: number; readonly sha256: string } | undefined;
}

/** About a centimetre. */
const DEGREE_DECIMALS = 7;
/** Whole millimetres. */
const METRE_DECIMALS = 3;
const SHARE_DECIMALS = 9;
const CORNERS = ["sw", "se", "ne", "nw"] as const;

/** Waypoints of the centres as GPX 1.1. */
export function waypointsGpx(cells: readonly NamedVisit[], places: FramePlaces, about: About): string {
  const waypoints = cells.map(({ view, name }) => {
    const { lng, lat, eastM, northM } = view.centre;
    return {
      lng,
      lat,
      name,
      comment: `${view.label} ${picksInWords(view.orders)}`,
      description: `Cell ${view.label}, unit ${view.visit.unit}, ${picksInWords(view.orders)}. Centre E ${eastM.toFixed(METRE_DECIMALS)} N ${northM.toFixed(METRE_DECIMALS)} m, ${places.crsName}.`,
      symbol: "Flag, Red",
    };
  });
  const witness = about.newest ? `record event ${about.newest.sequence}, ${about.newest.sha256}` : "";
  const description = [`${cells.length} cells to visit`, witness].filter((part) => part !== "").join("; ");
  return writeGpx(waypoints, { name: about.title, description, time: about.at }).value;
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
export function waypointsCsv(
  cells: readonly NamedVisit[],
  places: FramePlaces,
  { newest }: Pick<About, "newest">,
): string {
  const rows = cells.map(({ view, name }) => [
    name,
    view.visit.unit,
    view.label,
    view.orders.join(" "),
    view.orders.length,
    (view.shareBillionths / WHOLE_CELL).toFixed(SHARE_DECIMALS),
    view.assignment?.name ?? null,
    view.assignment?.day ?? null,
    ...[view.centre, ...places.cornersOf(view.visit.column, view.visit.row)].flatMap(coordinates),
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
