import { listSha256 } from "#shared/frame/list.ts";
import { findCrossing } from "#shared/geometry/noding.ts";
import { ringsFromJson, vertexCount } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import {
  type Check,
  counted,
  differ,
  type Difference,
  failed,
  firstDifference,
  notChecked,
  type ReplayRun,
  shortHash,
  verdict,
} from "./check.ts";
import type { RebuiltFrame } from "./frame-rebuilt.ts";

/** Rules R1 to R5, frame by frame: the sealed statement, exact rings, and the list that follows from them. */
export function checkFrames(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(["frame-sealed"]);
  return [...run.frames.values()].flatMap((frame) => {
    run.tell();
    const name = `frame ${frame.stored.number}`;
    return [checkSealed(run, frame, name, broken), checkRings(frame, name), checkList(run, frame, name)];
  });
}

const NOT_THE_SEALED = "This is not the statement that was sealed, so nothing is made from it.";

function checkSealed(run: ReplayRun, frame: RebuiltFrame, name: string, broken: string | null): Check {
  const id = `frame-${frame.stored.number}-sealed`;
  const title = `The statement of ${name} is the one that was sealed`;
  if (broken !== null) return notChecked(id, title, `Not compared: ${broken} is not whole.`);
  const event = run.events.of("frame-sealed").find(({ payload }) => payload.frameId === frame.stored.id);
  const sealed = event?.payload;
  const difference = firstDifference([
    () => differ(`${name}, hash of its statement`, frame.statementSha256, sealed?.frameSha256),
    () => (frame.statement === null ? unreadable(name, frame) : null),
    () => differ(`${name}, its number`, frame.stored.number, sealed?.number),
    () => differ(`${name}, its area`, frame.stored.areaId, sealed?.areaId),
    () => differ(`${name}, N in its event`, frame.statement?.units, sealed?.units),
    () => differ(`${name}, hash of the list in its event`, frame.statement?.listSha256, sealed?.listSha256),
    () => differ(`${name}, sealed at`, frame.stored.sealedAt, event?.at),
    () => differ(`${name}, sealed by`, frame.stored.member, event?.member),
  ]);
  return verdict(id, title, difference, `frame ${shortHash(frame.statementSha256)}`);
}

function unreadable(name: string, frame: RebuiltFrame): Difference {
  return { where: `${name}, its statement`, found: frame.refusal ?? "another format", expected: "quillet-frame/1" };
}

function checkRings(frame: RebuiltFrame, name: string): Check {
  const id = `frame-${frame.stored.number}-rings`;
  const title = `The rings of ${name} are exact: whole millimetres, no two edges cross`;
  if (!frame.isTheSealed || frame.statement === null) return notChecked(id, title, NOT_THE_SEALED);
  try {
    const area = ringsFromJson(frame.statement.rings);
    const crossing = findCrossing(area);
    if (crossing === null) return verdict(id, title, null, counted(vertexCount(area), "vertex", "vertices"));
    const { eastMm, northMm } = crossing.at;
    return failed(id, title, {
      where: `${name}, rings`,
      found: `two edges that meet at ${eastMm} mm east, ${northMm} mm north`,
      expected: "edges that meet at their ends only",
    });
  } catch (error) {
    if (!(error instanceof RangeError || error instanceof Problem)) throw error;
    return failed(id, title, { where: `${name}, rings`, found: error.message, expected: "rings in whole millimetres" });
  }
}

function checkList(run: ReplayRun, frame: RebuiltFrame, name: string): Check {
  const id = `frame-${frame.stored.number}-list`;
  const title = `The list of cells of ${name} follows from its rings`;
  const { statement, cells, refusal } = frame;
  if (!frame.isTheSealed || statement === null) return notChecked(id, title, NOT_THE_SEALED);
  if (cells === null) {
    return failed(id, title, { where: name, found: "a list", expected: refusal ?? "cells that can be made" });
  }
  const difference = firstDifference([
    () => differ(`${name}, N`, statement.units, cells.units),
    () => differ(`${name}, hash of the list`, statement.listSha256, listSha256(cells, run.tell)),
  ]);
  return verdict(id, title, difference, `${counted(cells.units, "unit")}, list ${shortHash(statement.listSha256)}`);
}
