import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex } from "@noble/hashes/utils.js";
import { areaAnswers } from "#shared/area/questions.ts";
import type { ImportedArea } from "#shared/area/imported-area.ts";
import { type AreaFile, readArea } from "#shared/exchange/read-area.ts";
import { type PlaneArea, ringsFromJson, ringsToJson, vertexCount } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import { crsFromText } from "#shared/projection/crs.ts";
import { makePlaneRings } from "#shared/area/plane.ts";
import { canonicalText } from "#shared/record/chain.ts";
import { type Check, failed, notChecked, passed, type ReplayRun, shortHash } from "./check.ts";
import type { RebuiltFrame } from "./frame-rebuilt.ts";
import { fartherThan } from "./ring-distance.ts";

/** Two computers' projections differ by far less; a boundary that was moved on purpose by more. */
export const RINGS_WITHIN_MM = 10;

type RecordArea = ReplayRun["record"]["areas"][number];

const HASH_TITLE = "The boundary file is the one that was imported";

/**
 * Rule R5: with the source file, its hash, and the rings against its projected edges within 10 mm both ways; without it
 * the rings are taken as given.
 */
export function checkSourceFile(run: ReplayRun): Check[] {
  const frames = [...run.frames.values()];
  const file = run.given.sourceFile;
  if (file === undefined) {
    return [
      notChecked("source-file", HASH_TITLE, "No file given. With it, replay can compare its hash and its edges."),
      ...frames.map((frame) => notChecked(id(frame), title(frame), "Rings taken as given.")),
    ];
  }
  const hash = bytesToHex(sha256(file.bytes));
  const area = run.record.areas.find(({ fileSha256 }) => fileSha256 === hash);
  if (area === undefined) {
    const known = run.record.areas.map(({ fileName, fileSha256 }) => `${fileName}, ${shortHash(fileSha256)}`);
    const difference = { where: `SHA-256 of ${file.name}`, found: known.join("; "), expected: shortHash(hash) };
    return [
      failed("source-file", HASH_TITLE, difference, "The file that you gave is another one."),
      ...frames.map((frame) => notChecked(id(frame), title(frame), "Not compared: the file is another one.")),
    ];
  }
  const mine = frames.filter(({ stored }) => stored.areaId === area.id);
  const others = frames.filter(({ stored }) => stored.areaId !== area.id);
  return [
    passed("source-file", HASH_TITLE, `${area.fileName}, SHA-256 ${hash}`),
    ...mine.map((frame) => checkRingsFollow(run, frame, file, area)),
    ...others.map((frame) => notChecked(id(frame), title(frame), "Rings taken as given: it stands on another file.")),
  ];
}

const id = (frame: RebuiltFrame): string => `frame-${frame.stored.number}-source`;
const title = (frame: RebuiltFrame): string =>
  `The rings of frame ${frame.stored.number} follow from the boundary file`;

function checkRingsFollow(run: ReplayRun, frame: RebuiltFrame, file: AreaFile, area: RecordArea): Check {
  const { statement } = frame;
  if (!frame.isTheSealed || statement === null) {
    return notChecked(id(frame), title(frame), "This is not the statement that was sealed.");
  }
  try {
    const source = readAgain(run, file, area);
    const { area: again } = makePlaneRings(source, crsFromText(statement.crs.text, run.given.epsg), run.tell);
    return compare(run, frame, ringsFromJson(statement.rings), again);
  } catch (error) {
    if (!(error instanceof Problem) || error.code === "cancelled") throw error;
    return notChecked(id(frame), title(frame), `The file cannot be read here. ${error.message}`);
  }
}

/** What the file left open is answered from the record; a report without answers is tried with each layer. */
function readAgain(run: ReplayRun, file: AreaFile, area: RecordArea): ImportedArea {
  const { epsg, geoPackage } = run.given;
  const tools = { ...(epsg && { epsg }), ...(geoPackage && { geoPackage }) };
  const given = areaAnswers.safeParse(area.report["answers"] ?? {});
  try {
    return readArea(file, { ...given.data, crs: area.sourceCrs }, tools).value.area;
  } catch (error) {
    if (!(error instanceof Problem) || error.question?.kind !== "layer") throw error;
    for (const layer of error.question["layers"] as readonly string[]) {
      const { value } = readArea(file, { crs: area.sourceCrs, layer }, tools);
      if (value.report.vertices === area.report["vertices"]) return value.area;
    }
    throw error;
  }
}

function compare(run: ReplayRun, frame: RebuiltFrame, found: PlaneArea, again: PlaneArea): Check {
  const points = `${vertexCount(found)} vertices in whole millimetres`;
  if (canonicalText(ringsToJson(found)) === canonicalText(ringsToJson(again))) {
    return passed(id(frame), title(frame), `${points}, all equal`);
  }
  const away = fartherThan(found, again, RINGS_WITHIN_MM, run.tell);
  const missed = away === null ? fartherThan(again, found, RINGS_WITHIN_MM, run.tell) : null;
  const far = away ?? missed;
  if (far === null) return passed(id(frame), title(frame), `${points}, within 10 mm of the file's edges both ways`);
  const what = away === null ? "an edge of the file" : "a ring";
  const other = away === null ? "the nearest ring" : "the file's nearest edge";
  return failed(id(frame), title(frame), {
    where: `${what} at ${far.eastMm} mm east, ${far.northMm} mm north`,
    found: `${other} ${Math.round(far.distanceMm)} mm away`,
    expected: "10 mm at most",
  });
}
