import type { ImportReport } from "#shared/area/report.ts";
import type { Stage, StageState } from "#shared/api/surveys.ts";
import { isClosing } from "#shared/field/states.ts";
import { areasOf } from "../db/areas.ts";
import type { CountRow } from "../db/counts.ts";
import { declarationsOf, drawsOf } from "../db/draws.ts";
import { keptEstimatesOf } from "../db/estimates.ts";
import { newestEvent } from "../db/events.ts";
import { framesOf } from "../db/frames.ts";
import type { Reader } from "../db/open.ts";
import { findSurvey } from "../db/surveys.ts";
import { assignmentsOf, visitsOn } from "../db/visits.ts";
import { localDay } from "./local-day.ts";
import { declaredText } from "./read-draws.ts";
import { type SeasonInUse, seasonInUse } from "./read-visits.ts";

type Standing = Pick<StageState, "state" | "note">;

const NOT_STARTED: Standing = { state: "not-started", note: "not started" };

const some = (count: number, one: string, many = `${one}s`): string => `${count} ${count === 1 ? one : many}`;

/** How each stage of a survey stands, at a glance: a state, and the line under its name. */
export function stageStates(reader: Reader, surveyId: string): StageState[] {
  const season = seasonInUse(reader, surveyId);
  const cells = cellsOf(reader, season);
  const of: Record<Stage, Standing> = {
    area: areaStanding(reader, surveyId),
    frame: frameStanding(reader, surveyId),
    plan: planStanding(reader, surveyId),
    draw: drawStanding(reader, surveyId, season),
    field: fieldStanding(reader, surveyId, season, cells),
    counts: countsStanding(season, cells),
    estimate: estimateStanding(reader, surveyId, cells),
    record: { state: "in-work", note: some(newestEvent(reader, surveyId)?.sequence ?? 0, "event") },
  };
  return Object.entries(of).map(([stage, standing]) => ({ stage: stage as Stage, ...standing }));
}

/** A cell in use, its earliest pick and what is written down for it. */
interface CellInUse {
  readonly unit: number;
  readonly position: number;
  readonly visitId: string | undefined;
  readonly count: CountRow | undefined;
}

function cellsOf(reader: Reader, { live, lists, counts, seasonId }: SeasonInUse): CellInUse[] {
  if (!live) return [];
  const visits = new Map(visitsOn(reader, seasonId, live.draw.frameVersionId).map((visit) => [visit.unit, visit.id]));
  const cells = new Map<number, CellInUse>();
  for (const { unit, position } of lists.flatMap((list) => list.use.inUse)) {
    if (cells.has(unit)) continue;
    const visitId = visits.get(unit);
    cells.set(unit, { unit, position, visitId, count: visitId === undefined ? undefined : counts.get(visitId) });
  }
  return [...cells.values()];
}

const hasValue = ({ count }: CellInUse): boolean => count !== undefined && !isClosing(count.state);

function areaStanding(reader: Reader, surveyId: string): Standing {
  const [newest] = areasOf(reader, surveyId);
  if (!newest) return NOT_STARTED;
  const { parts, holes } = newest.report as ImportReport;
  return { state: "done", note: holes === 0 ? some(parts, "area") : `${some(parts, "area")}, ${some(holes, "hole")}` };
}

function frameStanding(reader: Reader, surveyId: string): Standing {
  const [newest] = framesOf(reader, surveyId);
  if (!newest) return NOT_STARTED;
  if (newest.sealedAt === null) return { state: "in-work", note: `version ${newest.number}, not sealed` };
  return { state: "done", note: `version ${newest.number}, sealed` };
}

function planStanding(reader: Reader, surveyId: string): Standing {
  const newest = declarationsOf(reader, surveyId).find((one) => one.abandoned === null);
  return newest ? { state: "done", note: `n = ${declaredText(newest).design.n} declared` } : NOT_STARTED;
}

function drawStanding(reader: Reader, surveyId: string, { live, seasonId }: SeasonInUse): Standing {
  if (live) return { state: "done", note: `draw ${live.draw.number}, live` };
  const [declared] = declarationsOf(reader, surveyId).filter((one) => one.declaration.seasonId === seasonId);
  if (declared && declared.drawId === null && declared.abandoned === null) {
    return { state: "in-work", note: "declared, not drawn" };
  }
  const [last] = drawsOf(reader, surveyId);
  return last ? { state: "attention", note: `draw ${last.draw.number} withdrawn` } : NOT_STARTED;
}

function fieldStanding(reader: Reader, surveyId: string, season: SeasonInUse, cells: readonly CellInUse[]): Standing {
  if (!season.live) return NOT_STARTED;
  const toClose = cells.filter(({ count }) => count !== undefined && isClosing(count.state));
  const [first] = toClose;
  if (first) {
    const note = toClose.length === 1 ? `pick ${first.position} to be closed` : `${toClose.length} cells to be closed`;
    return { state: "attention", note };
  }
  const unreplaced = season.lists.reduce((sum, list) => sum + list.use.unfilled, 0);
  if (unreplaced > 0) return { state: "attention", note: `${some(unreplaced, "pick")} not counted` };
  if (cells.every(hasValue)) return { state: "done", note: `${some(cells.length, "cell")} visited` };
  const assigned = new Set(assignmentsOf(reader, surveyId).map((row) => row.visitId));
  const shared = cells.filter(({ visitId }) => visitId !== undefined && assigned.has(visitId)).length;
  if (shared === 0) return { state: "not-started", note: "not shared out" };
  return { state: "in-work", note: `${shared} of ${some(cells.length, "cell")} shared out` };
}

function countsStanding({ live }: SeasonInUse, cells: readonly CellInUse[]): Standing {
  if (!live) return NOT_STARTED;
  const counted = cells.filter(hasValue).length;
  const state = counted === 0 ? "not-started" : counted === cells.length ? "done" : "in-work";
  return { state, note: `${counted} of ${some(cells.length, "cell")}` };
}

function estimateStanding(reader: Reader, surveyId: string, cells: readonly CellInUse[]): Standing {
  const kept = keptEstimatesOf(reader, surveyId).at(-1);
  const entered = cells.flatMap(({ count }) => (count ? [count.enteredAt] : [])).toSorted();
  if (kept) {
    const note = `kept on ${dayOf(reader, surveyId, kept.keptAt)}`;
    const since = (entered.at(-1) ?? "") > kept.keptAt;
    return since ? { state: "attention", note: `${note}, counts since` } : { state: "done", note };
  }
  return cells.some(hasValue) ? { state: "in-work", note: "not kept yet" } : NOT_STARTED;
}

/** "9 July": the day of a time, for the people there. */
function dayOf(reader: Reader, surveyId: string, at: string): string {
  const day = new Date(localDay(at, findSurvey(reader, surveyId)?.timeZone ?? "UTC"));
  return new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "long", timeZone: "UTC" }).format(day);
}
