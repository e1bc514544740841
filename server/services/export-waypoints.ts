import { type NameScheme, waypointNames } from "#shared/field/waypoint-names.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { findPlane } from "../db/areas.ts";
import { newestEvent } from "../db/events.ts";
import { findFrameHead, specOf } from "../db/frames.ts";
import { writeTx } from "../db/open.ts";
import { currentSeason, findSurvey } from "../db/surveys.ts";
import { type WaypointCell, type WaypointsTask, type WrittenWaypoints } from "../jobs/write-waypoints.ts";
import { actingMember } from "./acting-member.ts";
import { fileNamePart } from "./file-name-part.ts";
import { listVisits, type VisitView } from "./read-visits.ts";
import { recordEvent } from "./record-event.ts";

interface Wanted {
  readonly format: "gpx" | "csv";
  readonly nameLength: number;
  readonly scheme?: NameScheme | undefined;
  readonly prefix: string;
  /** Only the cells of this member. */
  readonly memberId: string | null;
}

export interface WaypointFile {
  readonly name: string;
  readonly format: "gpx" | "csv";
  readonly text: string;
}

/** At most so many clashes are listed in a refusal. */
const CLASHES_SHOWN = 5;
const ATTEMPTS = 5;

/**
 * One waypoint a cell that is to be visited, under names that every GPS unit keeps apart. The file quotes the newest event,
 * so it is made (in a worker) before the write lock is taken, and made again where another event came
 * meanwhile.
 * @throws Problem `changed-meanwhile` where events come faster than the file is made.
 */
export async function exportWaypoints(ctx: Context, wanted: Wanted, signal: AbortSignal): Promise<WaypointFile> {
  for (let attempt = 0; attempt < ATTEMPTS; attempt += 1) {
    const { task, draw } = gather(ctx, wanted);
    const file = await ctx.jobs.run("write-waypoints", task, signal);
    if (!putOnRecord(ctx, wanted, task, draw.id, file)) continue;
    const name = `${fileNamePart(task.title)}-draw-${draw.number}.${wanted.format}`;
    return { name, format: wanted.format, text: file.text };
  }
  throw new Problem(
    "changed-meanwhile",
    "Others kept writing to the record while the file was made. Nothing was exported: do it again in a moment.",
  );
}

/** All that the file says, as the survey stands now; the newest event is read first, so that nothing can be newer than it. */
function gather(ctx: Context, wanted: Wanted): { task: WaypointsTask; draw: { id: string; number: number } } {
  const newest = newestEvent(ctx.db, ctx.surveyId);
  const { season, visits } = listVisits(ctx);
  if (!season.live) throw new Problem("draw-missing", "Draw cells first: there is nothing to visit yet.");
  const { draw } = season.live;
  const frame = findFrameHead(ctx.db, draw.frameVersionId);
  const spec = frame && specOf(frame);
  const plane = frame && spec && findPlane(ctx.db, frame.areaVersionId, spec.epsg);
  if (!plane) throw new Error(`draw ${draw.id} has no frame or no plane`);
  const task = {
    format: wanted.format,
    cells: named(chosen(ctx, visits, wanted.memberId), wanted),
    spec: spec.cells,
    crs: { name: plane.crsName, text: plane.crsText },
    title: `${findSurvey(ctx.db, ctx.surveyId)?.name ?? "survey"} ${currentSeason(ctx.db, ctx.surveyId).name}`,
    at: ctx.now().toISOString(),
    newest: newest ? { sequence: newest.sequence, sha256: newest.sha256 } : null,
  };
  return { task, draw };
}

/** Appends the event, unless the record has grown since the file quoted it. */
function putOnRecord(
  ctx: Context,
  { format, nameLength }: Wanted,
  { cells, at, newest }: WaypointsTask,
  drawId: string,
  { sha256 }: WrittenWaypoints,
): boolean {
  return writeTx(ctx.db, (tx) => {
    if (newestEvent(tx, ctx.surveyId)?.sha256 !== newest?.sha256) return false;
    recordEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId: actingMember(ctx),
      kind: "waypoints-exported",
      payload: { version: 1, drawId, format, cells: cells.length, nameLength, fileSha256: sha256 },
    });
    return true;
  });
}

function chosen(ctx: Context, visits: readonly VisitView[], memberId: string | null): VisitView[] {
  if (ctx.reach === "own" && memberId !== null && memberId !== ctx.memberId) {
    throw new Problem("not-allowed", "These cells are somebody else's. Export your own.");
  }
  const cells = visits.filter(
    (visit) => !visit.closed && (memberId === null || visit.assignment?.memberId === memberId),
  );
  if (cells.length > 0) return cells;
  throw new Problem(
    "nothing-to-export",
    "No cell to visit is assigned here. Ask the field lead to share out the cells.",
  );
}

function named(visits: readonly VisitView[], wanted: Wanted): WaypointCell[] {
  const cells = visits.map((visit) => ({ label: visit.label, unit: visit.visit.unit, order: visit.orders[0] ?? 0 }));
  const { names, clashes, nextStep } = waypointNames(cells, {
    length: wanted.nameLength,
    scheme: wanted.scheme ?? "label",
    prefix: wanted.prefix,
  });
  if (clashes.length > 0) {
    const listed = clashes
      .slice(0, CLASHES_SHOWN)
      .map(({ name, labels }) => `${name === "" ? "an empty name" : name} would stand for ${labels.join(", ")}`);
    const more = clashes.length > CLASHES_SHOWN ? `; ${clashes.length - CLASHES_SHOWN} more` : "";
    throw new Problem("names-clash", `${listed.join("; ")}${more}. ${nextStep ?? ""}`.trim());
  }
  return visits.map(({ visit, label, shareBillionths, orders, assignment }, i) => ({
    name: names[i] ?? "",
    ...{ unit: visit.unit, column: visit.column, row: visit.row, label, shareBillionths, orders },
    assignedTo: assignment ? { name: assignment.name, day: assignment.day } : null,
  }));
}
