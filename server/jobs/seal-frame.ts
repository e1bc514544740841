import type { FrameSpec } from "#shared/api/frame.ts";
import type { Membership } from "#shared/frame/cell-spec.ts";
import { packCells } from "#shared/frame/pack.ts";
import { buildStatement, frameSha256, statementText } from "#shared/frame/statement.ts";
import { summarise } from "#shared/frame/summary.ts";
import { findCrossing } from "#shared/geometry/noding.ts";
import { ringsFromJson } from "#shared/geometry/rings.ts";
import { billionths } from "#shared/units/metric.ts";
import type { JobResults, JobTasks } from "./tasks.ts";

/** Rings and settings → list, statement and hashes of a frame (rules R3 to R5), with its cells packed. */
export function sealFrameTask(task: JobTasks["seal-frame"]): JobResults["seal-frame"] {
  const area = ringsFromJson(JSON.parse(task.rings));
  const crossing = findCrossing(area);
  if (crossing) throw new Error(`stored rings cross at ${crossing.at.eastMm}, ${crossing.at.northMm} mm`);
  const { countIn, leftOut, cells: spec } = task.spec;
  const membership = membershipOf(task.spec);
  const { crs, source, mending, salt } = task;
  const { statement, measured, cells } = buildStatement({
    crs,
    source,
    mending,
    area,
    spec,
    membership,
    countIn,
    leftOut,
    salt,
  });
  const { shareSumBillionths, ...summary } = summarise(measured, membership, countIn, leftOut);
  return {
    statement: statementText(statement),
    frameSha256: frameSha256(statement),
    listSha256: statement.listSha256,
    units: cells.units,
    cells: packCells(cells),
    summary,
  };
}

function membershipOf({ membership }: FrameSpec): Membership {
  return membership.rule === "share" ? { rule: "share", atLeast: billionths(membership.atLeast) } : membership;
}
