import { createHash, randomBytes } from "node:crypto";
import { basename } from "node:path";
import { makePlaneRings } from "#shared/area/plane.ts";
import { readArea } from "#shared/exchange/read-area.ts";
import { billionths } from "#shared/units/metric.ts";
import { type CountIn, EDGE_PRESETS, type Membership } from "#shared/frame/cell-spec.ts";
import { writeList } from "#shared/frame/list.ts";
import { measureCells } from "#shared/frame/measure.ts";
import { selectCells } from "#shared/frame/select.ts";
import { buildStatement, frameSha256, type StatementParts, statementText } from "#shared/frame/statement.ts";
import { summarise } from "#shared/frame/summary.ts";
import { findCrossing, nodeRings } from "#shared/geometry/noding.ts";
import { type PlaneArea, ringsFromJson } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import { crsFromText } from "#shared/projection/crs.ts";
import { readBytes, readText, writeFile } from "./files.ts";
import { readLeftOut } from "./left-out.ts";
import { decimalSteps, needed, notInThisVersion, oneOf, options, printJson, sayError, UsageError } from "./usage.ts";

const KNOWN = {
  area: { type: "string" },
  rings: { type: "string" },
  crs: { type: "string" },
  cell: { type: "string" },
  height: { type: "string" },
  shape: { type: "string" },
  rotate: { type: "string" },
  origin: { type: "string" },
  edge: { type: "string" },
  zones: { type: "string" },
  strata: { type: "string" },
  name: { type: "string" },
  "leave-out": { type: "string" },
  list: { type: "string" },
  out: { type: "string" },
} as const;

type Values = Readonly<Partial<Record<keyof typeof KNOWN, string>>>;

/** Where the rings come from: what a statement says of the boundary. */
type Ground = Pick<StatementParts, "crs" | "source" | "mending" | "area">;

/** `quillet grid`: boundary or rings to cells, list and frame statement (rules R1 to R5). */
export async function grid(args: readonly string[]): Promise<number> {
  const values: Values = options(args, KNOWN, 0).values;
  refuseLater(values);
  const spec = specOf(values);
  const edge = edgeOf(values.edge ?? "clip");
  const ground = await groundOf(values);
  const leftOut =
    values["leave-out"] === undefined
      ? []
      : readLeftOut(readBytes(values["leave-out"]), selectCells(measureCells(ground.area, spec), edge.membership, []));
  const salt = randomBytes(16).toString("hex");
  const { statement, measured, cells } = buildStatement({ ...ground, spec, ...edge, leftOut, salt });
  if (values.list !== undefined) {
    const parts: Uint8Array[] = [];
    writeList(cells, (bytes) => void parts.push(bytes.slice()));
    writeFile(values.list, Buffer.concat(parts));
  }
  if (values.out !== undefined) writeFile(values.out, statementText(statement));
  const summary = summarise(measured, edge.membership, edge.countIn, leftOut);
  printJson({
    crs: ground.crs.epsg === null ? ground.crs.text : `EPSG:${ground.crs.epsg}`,
    cells: cells.units,
    frameAreaM2: summary.frameAreaM2,
    areaM2: summary.areaM2,
    uncoveredM2: summary.uncoveredM2,
    listSha256: statement.listSha256,
    frameSha256: frameSha256(statement),
  });
  return 0;
}

function refuseLater(values: Values): void {
  oneOf(values.shape ?? "square", "--shape", ["square"], ["hexagon"]);
  if (values.rotate !== undefined && decimalSteps(values.rotate, "--rotate", 6) !== 0) {
    throw notInThisVersion("--rotate other than 0");
  }
  for (const name of ["zones", "strata", "name"] as const) {
    if (values[name] !== undefined) throw notInThisVersion(`--${name}`);
  }
}

function specOf(values: Values): StatementParts["spec"] {
  const widthMm = decimalSteps(needed(values.cell, "--cell"), "--cell", 3);
  const heightMm = values.height === undefined ? widthMm : decimalSteps(values.height, "--height", 3);
  const [east = "", north = "", ...more] = (values.origin ?? "0,0").split(",");
  if (more.length > 0 || east === "" || north === "") {
    throw new UsageError(`--origin is east and north in metres, such as 0,0; got "${values.origin ?? ""}".`);
  }
  return {
    shape: "rectangle",
    widthMm,
    heightMm,
    originEastMm: decimalSteps(east, "--origin", 3),
    originNorthMm: decimalSteps(north, "--origin", 3),
    rotationMicroDegrees: 0,
  };
}

function edgeOf(text: string): { membership: Membership; countIn: CountIn } {
  if (text === "clip" || text === "centre" || text === "inside") return EDGE_PRESETS[text];
  const [rule, share, countIn, ...more] = text.split(":");
  if (rule !== "share" || share === undefined || more.length > 0 || (countIn !== "inside" && countIn !== "whole")) {
    throw new UsageError(
      `--edge is clip, centre, inside, share:P:inside or share:P:whole with P such as 0.5; got "${text}".`,
    );
  }
  const atLeast = decimalSteps(share, "the share of --edge", 9);
  if (atLeast < 1 || atLeast > 1e9)
    throw new UsageError(`The share of --edge is above 0 and at most 1; got "${share}".`);
  return { membership: { rule: "share", atLeast: billionths(atLeast) }, countIn };
}

async function groundOf(values: Values): Promise<Ground> {
  if ((values.area === undefined) === (values.rings === undefined)) {
    throw new UsageError("Give either --area FILE or --rings FILE.");
  }
  return values.rings === undefined ? fromBoundary(values) : fromRings(values.rings, values.crs);
}

async function fromBoundary(values: Values): Promise<Ground> {
  const { epsgLookup } = await import("../jobs/epsg.ts");
  const path = needed(values.area, "--area");
  const crs = crsFromText(needed(values.crs, "--crs"), epsgLookup);
  const file = { name: basename(path), bytes: readBytes(path) };
  const { readGeoPackage } = await import("../jobs/read-geopackage.ts");
  const { value, notes } = readArea(file, {}, { epsg: epsgLookup, geoPackage: readGeoPackage });
  const made = makePlaneRings(value.area, crs);
  for (const note of [...notes, ...made.notes]) sayError(note);
  return {
    crs: { text: crs.text, epsg: crs.epsg },
    source: { sha256: createHash("sha256").update(file.bytes).digest("hex"), crs: value.report.crs.text },
    mending: value.report.mended,
    area: made.area,
  };
}

/** Whole-millimetre rings as they stand in a file; edges that meet get a vertex where they meet. */
function fromRings(path: string, crsText: string | undefined): Ground {
  const value = jsonOf(path);
  const given = crsText ?? value.crs;
  const epsg = /^EPSG:(\d{1,9})$/i.exec(given ?? "")?.[1];
  const crs = { text: given ?? "unknown", epsg: epsg === undefined ? null : Number(epsg) };
  const area = ringsFromJson(value.polygons);
  if (findCrossing(area) === null) return { crs, source: null, mending: [], area };
  const noded: PlaneArea = nodeRings(area.polygons.flat());
  const mending = ["Edges that met or crossed were given a vertex where they did."];
  sayError(mending[0] ?? "");
  return { crs, source: null, mending, area: noded };
}

function jsonOf(path: string): { readonly crs: string | undefined; readonly polygons: unknown } {
  let value: unknown;
  try {
    value = JSON.parse(readText(path));
  } catch (error) {
    if (error instanceof Problem) throw error;
    throw new Problem(
      "file-damaged",
      `${path} is not JSON. Give rings as {"crs": …, "polygons": [[ring, hole, …], …]}.`,
    );
  }
  if (typeof value !== "object" || value === null || !("polygons" in value)) {
    throw new Problem(
      "file-unknown",
      `${path} has no "polygons". Give rings as {"crs": …, "polygons": [[ring, …], …]}.`,
    );
  }
  return { crs: "crs" in value && typeof value.crs === "string" ? value.crs : undefined, polygons: value.polygons };
}
