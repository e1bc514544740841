import proj4 from "proj4";
import { Problem } from "#shared/problem.ts";
import type { Crs } from "#shared/projection/crs.ts";

/** What proj4 made of a definition, as far as it is looked at here; every field may be missing. */
interface Parsed {
  readonly projName?: string;
  readonly to_meter?: number;
  readonly units?: string;
  readonly axis?: string;
  readonly nadgrids?: string;
  readonly datumCode?: string;
  readonly a?: number;
  readonly b?: number;
  readonly datum?: { readonly datum_type: number };
}

interface Definition {
  readonly text: string;
  readonly epsg: number | null;
  readonly name: string;
  /** Area of use in degrees: west, south, east, north. */
  readonly bounds?: readonly [number, number, number, number] | undefined;
}

/** About two centimetres, well below what a datum shift by parameters promises. */
const ROUND_TRIP_DEGREES = 2e-7;

/** proj4's kinds of datum: parameters, a grid file, the same as WGS 84, or nothing known. */
const SHIFT_3 = 1;
const SHIFT_7 = 2;
const SHIFT_GRID = 3;
const NOTHING_KNOWN = 5;

const WGS84_MAJOR_AXIS = 6_378_137;
const WGS84_MINOR_AXIS = 6_356_752.3;

/**
 * Turns a PROJ or WKT text into a Crs, after making sure that converting it is not silently wrong: proj4 leaves out a datum
 * shift that it does not know, and a grid file that is not there. Systems on the ellipsoids GRS80 and WGS 84 without a stated
 * shift (ETRS89, NAD83, GDA94 …) are taken as WGS 84, as is usual; they differ from it by less than two metres.
 * @throws Problem crs-unsupported with the reason, crs-unknown when the text cannot be read.
 */
export function inspectDefinition({ text, epsg, name, bounds }: Definition): Crs {
  refuseByText(text, name);
  const parsed = parse(text, name);
  if (bounds !== undefined) checkRoundTrip(text, name, bounds);
  const kind = parsed.projName === "longlat" || parsed.projName === "identity" ? "geographic" : "projected";
  const note = datumNote(parsed, name);
  if (kind === "geographic") return { text, epsg, name, kind, metresPerUnit: null, note };
  const metresPerUnit = parsed.to_meter ?? 1;
  if (!Number.isFinite(metresPerUnit) || metresPerUnit <= 0) {
    throw new Problem(
      "crs-unsupported",
      `The unit of length of ${name} is not known. Convert the file to a system in metres.`,
    );
  }
  return { text, epsg, name, kind, metresPerUnit, note };
}

/** What only the text shows: axes that run west or south, grads, vertical parts. */
function refuseByText(text: string, name: string): void {
  const axis = /\+axis=(\S+)/.exec(text)?.[1];
  if ((axis !== undefined && /[ws]/.test(axis)) || /AXIS\s*\[[^\]]*,\s*WEST\s*\]/i.test(text)) {
    throw new Problem(
      "crs-unsupported",
      `The axes of ${name} run west or south, and files in it are written in more than one way. Convert the file to a system whose axes run east and north.`,
    );
  }
  const angle = /GEOGCS\s*\[.*?UNIT\s*\[\s*"([^"]*)"\s*,\s*([0-9.eE+-]+)/is.exec(text);
  if (angle?.[2] !== undefined && Math.abs(Number(angle[2]) - Math.PI / 180) > 1e-9) {
    throw new Problem(
      "crs-unsupported",
      `The angles of ${name} are in ${angle[1] ?? "another unit"}, not in degrees. Convert the file to a system in degrees or metres.`,
    );
  }
  const grid = /\+nadgrids=(\S+)/.exec(text)?.[1];
  if (grid !== undefined && grid !== "@null") throw gridMissing(name, grid);
}

function parse(text: string, name: string): Parsed {
  let parsed: Parsed;
  try {
    parsed = new proj4.Proj(text);
  } catch {
    throw new Problem(
      "crs-unknown",
      `The definition of ${name} cannot be read, or its projection is not one that is known here. Give an EPSG code, such as EPSG:25831.`,
    );
  }
  if (parsed.projName === undefined)
    throw new Problem(
      "crs-unknown",
      `The definition of ${name} names no projection. Give an EPSG code, such as EPSG:25831.`,
    );
  return parsed;
}

/** There and back in the middle of the area of use must come home; some shifts with large rotations do not, by metres. */
function checkRoundTrip(
  text: string,
  name: string,
  [west, south, east, north]: readonly [number, number, number, number],
): void {
  const longitude = west <= east ? (west + east) / 2 : (((west + east + 360) / 2 + 180) % 360) - 180;
  const latitude = (south + north) / 2;
  const converter = proj4("+proj=longlat +datum=WGS84 +no_defs", text);
  let back: number[];
  try {
    back = converter.inverse(converter.forward([longitude, latitude]));
  } catch {
    back = [];
  }
  const error = Math.max(Math.abs(remainder(back[0] ?? NaN, longitude)), Math.abs((back[1] ?? NaN) - latitude));
  if (error <= ROUND_TRIP_DEGREES) return;
  throw new Problem(
    "crs-unsupported",
    `Converting to ${name} and back does not come home, so it cannot be converted exactly here. Convert the file to WGS 84, ETRS89 or NAD83.`,
  );
}

/** The difference of two longitudes, in −180 … 180. */
const remainder = (a: number, b: number): number => {
  const turn = (a - b) % 360;
  return turn > 180 ? turn - 360 : turn < -180 ? turn + 360 : turn;
};

/** A note on how good the datum shift is. @throws Problem crs-unsupported where the shift would be left out. */
function datumNote(parsed: Parsed, name: string): string | null {
  const type = parsed.datum?.datum_type ?? NOTHING_KNOWN;
  // "+nadgrids=@null" says that latitudes on the sphere are those of WGS 84 (Web Mercator); proj4 notes it so.
  if (parsed.datumCode === "none") return null;
  if (type === SHIFT_GRID) throw gridMissing(name, parsed.nadgrids ?? "a grid file");
  if (type === NOTHING_KNOWN && !isModernEllipsoid(parsed)) {
    throw new Problem(
      "crs-unsupported",
      `How ${name} lies to WGS 84 is not stated, and leaving the shift out may move everything by tens or hundreds of metres. Give its EPSG code if you know it, or convert the file to WGS 84, ETRS89 or NAD83.`,
    );
  }
  if (type === SHIFT_3) return "The shift to WGS 84 is by three parameters: good to about 5 to 30 m.";
  if (type === SHIFT_7) return "The shift to WGS 84 is by seven parameters: good to about 1 to 5 m.";
  return null;
}

const gridMissing = (name: string, grid: string): Problem =>
  new Problem(
    "crs-unsupported",
    `${name} needs the grid file ${grid.replaceAll('"', "")} to be converted exactly, and that file is not part of this program. Convert the file to WGS 84, ETRS89 or NAD83.`,
  );

const isModernEllipsoid = ({ a, b }: Parsed): boolean =>
  a !== undefined && b !== undefined && Math.abs(a - WGS84_MAJOR_AXIS) < 0.001 && Math.abs(b - WGS84_MINOR_AXIS) < 0.1;
