import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";
import { waypointNames, type NameScheme } from "#shared/field/waypoint-names.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { appendEvent, newestEvent } from "../db/events.ts";
import { type Reader, writeTx } from "../db/open.ts";
import { currentSeason, findSurvey } from "../db/surveys.ts";
import { actingMember } from "./acting-member.ts";
import { framePlaces } from "./frame-places.ts";
import { listVisits, type VisitView } from "./read-visits.ts";
import { fileNamePart } from "./file-name-part.ts";
import { type NamedVisit, waypointsCsv, waypointsGpx } from "./waypoint-files.ts";

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

/** One waypoint a cell that is to be visited, under names that every GPS unit keeps apart. */
export function exportWaypoints(ctx: Context, wanted: Wanted): WaypointFile {
  const memberId = actingMember(ctx);
  return writeTx(ctx.db, (tx) => {
    const { season, visits } = listVisits(ctx, tx);
    if (!season.live) throw new Problem("draw-missing", "Draw cells first: there is nothing to visit yet.");
    const cells = named(chosen(ctx, visits, wanted.memberId), wanted);
    const places = framePlaces(tx, season.live.draw.frameVersionId);
    const at = ctx.now().toISOString();
    const about = { title: titleOf(tx, ctx.surveyId), at, newest: newestEvent(tx, ctx.surveyId) };
    const text = wanted.format === "gpx" ? waypointsGpx(cells, places, about) : waypointsCsv(cells, places, about);
    appendEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId,
      kind: "waypoints-exported",
      payload: {
        version: 1,
        drawId: season.live.draw.id,
        format: wanted.format,
        cells: cells.length,
        nameLength: wanted.nameLength,
        fileSha256: bytesToHex(sha256(utf8ToBytes(text))),
      },
    });
    const name = `${fileNamePart(about.title)}-draw-${season.live.draw.number}.${wanted.format}`;
    return { name, format: wanted.format, text };
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

function named(visits: readonly VisitView[], wanted: Wanted): NamedVisit[] {
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
  return visits.map((view, i) => ({ view, name: names[i] ?? "" }));
}

function titleOf(reader: Reader, surveyId: string): string {
  return `${findSurvey(reader, surveyId)?.name ?? "survey"} ${currentSeason(reader, surveyId).name}`;
}
