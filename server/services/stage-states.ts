import type { ImportReport } from "#shared/area/report.ts";
import type { Stage, StageState } from "#shared/api/surveys.ts";
import { localDay } from "./local-day.ts";
import { declaredText } from "./read-draws.ts";
import { countsSinceKept, hasValue, isReported, openDeclarationIn, type SurveyFacts } from "./survey-facts.ts";

type Standing = Pick<StageState, "state" | "note">;

const NOT_STARTED: Standing = { state: "not-started", note: "not started" };

const some = (count: number, one: string, many = `${one}s`): string => `${count} ${count === 1 ? one : many}`;

/** How each stage of a survey stands, at a glance: a state, and the line under its name. A counter is told of their own cells only. */
export function stageStates(facts: SurveyFacts): StageState[] {
  if (facts.ownOnly) {
    return [
      { stage: "field", ...ownFieldStanding(facts) },
      { stage: "counts", ...ownCountsStanding(facts) },
    ];
  }
  const of: Record<Stage, Standing> = {
    area: areaStanding(facts),
    frame: frameStanding(facts),
    plan: planStanding(facts),
    draw: drawStanding(facts),
    field: fieldStanding(facts),
    counts: countsStanding(facts),
    estimate: estimateStanding(facts),
    record: { state: "in-work", note: some(facts.newestEvent?.sequence ?? 0, "event") },
  };
  return Object.entries(of).map(([stage, standing]) => ({ stage: stage as Stage, ...standing }));
}

function ownFieldStanding({ cells }: SurveyFacts): Standing {
  if (cells.length === 0) return { state: "not-started", note: "no cells are yours yet" };
  const left = cells.filter(({ count }) => count === undefined).length;
  if (left === 0) return { state: "done", note: `your ${some(cells.length, "cell")} visited` };
  return { state: "in-work", note: `${left} of your ${some(cells.length, "cell")} to visit` };
}

function ownCountsStanding({ cells }: SurveyFacts): Standing {
  if (cells.length === 0) return NOT_STARTED;
  const counted = cells.filter(hasValue).length;
  const state = counted === 0 ? "not-started" : counted === cells.length ? "done" : "in-work";
  return { state, note: `${counted} of your ${some(cells.length, "cell")}` };
}

function areaStanding({ area }: SurveyFacts): Standing {
  if (!area) return NOT_STARTED;
  const { parts, holes } = area.report as ImportReport;
  return { state: "done", note: holes === 0 ? some(parts, "area") : `${some(parts, "area")}, ${some(holes, "hole")}` };
}

function frameStanding({ frame }: SurveyFacts): Standing {
  if (!frame) return NOT_STARTED;
  if (frame.sealedAt === null) return { state: "in-work", note: `version ${frame.number}, not sealed` };
  return { state: "done", note: `version ${frame.number}, sealed` };
}

function planStanding({ declarations }: SurveyFacts): Standing {
  const newest = declarations.find((one) => one.abandoned === null);
  return newest ? { state: "done", note: `n = ${declaredText(newest).design.n} declared` } : NOT_STARTED;
}

function drawStanding(facts: SurveyFacts): Standing {
  const { live } = facts.season;
  if (live) return { state: "done", note: `draw ${live.draw.number}, live` };
  if (openDeclarationIn(facts)) return { state: "in-work", note: "declared, not drawn" };
  const [last] = facts.draws;
  return last ? { state: "attention", note: `draw ${last.draw.number} withdrawn` } : NOT_STARTED;
}

function fieldStanding({ season, cells }: SurveyFacts): Standing {
  if (!season.live) return NOT_STARTED;
  const toClose = cells.filter(isReported);
  const [first] = toClose;
  if (first) {
    const note = toClose.length === 1 ? `pick ${first.position} to be closed` : `${toClose.length} cells to be closed`;
    return { state: "attention", note };
  }
  const unreplaced = season.lists.reduce((sum, list) => sum + list.use.unfilled, 0);
  if (unreplaced > 0) return { state: "attention", note: `${some(unreplaced, "pick")} not counted` };
  if (cells.every(hasValue)) return { state: "done", note: `${some(cells.length, "cell")} visited` };
  const shared = cells.filter(({ assignment }) => assignment !== undefined).length;
  if (shared === 0) return { state: "not-started", note: "not shared out" };
  return { state: "in-work", note: `${shared} of ${some(cells.length, "cell")} shared out` };
}

function countsStanding({ season, cells }: SurveyFacts): Standing {
  if (!season.live) return NOT_STARTED;
  const counted = cells.filter(hasValue).length;
  const state = counted === 0 ? "not-started" : counted === cells.length ? "done" : "in-work";
  return { state, note: `${counted} of ${some(cells.length, "cell")}` };
}

function estimateStanding(facts: SurveyFacts): Standing {
  const { keptAt, cells, survey } = facts;
  if (keptAt === null) return cells.some(hasValue) ? { state: "in-work", note: "not kept yet" } : NOT_STARTED;
  const note = `kept on ${dayOf(keptAt, survey.timeZone)}`;
  return countsSinceKept(facts) ? { state: "attention", note: `${note}, counts since` } : { state: "done", note };
}

/** "9 July": the day of a time, for the people there. */
function dayOf(at: string, timeZone: string): string {
  const day = new Date(localDay(at, timeZone));
  return new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "long", timeZone: "UTC" }).format(day);
}
