import { reach, type Role } from "#shared/access/table.ts";
import { isClosing } from "#shared/field/states.ts";
import { type AreaHead, newestArea } from "../db/areas.ts";
import type { CountRow } from "../db/counts.ts";
import { type DeclarationState, declarationsOf, type DrawState, drawsOf } from "../db/draws.ts";
import { newestKeptAt } from "../db/estimates.ts";
import { type EventRow, newestEvent } from "../db/events.ts";
import { type FrameRow, newestFrame } from "../db/frames.ts";
import { standingOf } from "../db/members.ts";
import type { Reader } from "../db/open.ts";
import type { SurveyRow } from "../db/surveys.ts";
import { type AssignmentView, assignmentsOf, visitsOn } from "../db/visits.ts";
import { type SeasonInUse, seasonInUse } from "./read-visits.ts";

/** A cell in use, its earliest pick, who goes there, and what is written down for it. */
export interface CellInUse {
  readonly unit: number;
  readonly position: number;
  readonly visitId: string | undefined;
  readonly assignment: AssignmentView | undefined;
  readonly count: CountRow | undefined;
}

/** What the stages of a survey and what waits in it are read from; a fixed number of queries, whatever its size. */
export interface SurveyFacts {
  readonly survey: SurveyRow;
  readonly memberId: string | null;
  readonly roles: readonly Role[];
  /** Whoever asks may know of their own cells only. */
  readonly ownOnly: boolean;
  readonly area: AreaHead | undefined;
  readonly frame: Pick<FrameRow, "number" | "sealedAt"> | undefined;
  /** Newest first. */
  readonly declarations: readonly DeclarationState[];
  /** Newest first. */
  readonly draws: readonly DrawState[];
  readonly season: SeasonInUse;
  /** The cells in use; of those who may know of their own only, theirs. */
  readonly cells: readonly CellInUse[];
  readonly keptAt: string | null;
  readonly newestEvent: EventRow | undefined;
}

/** Everything that the list of surveys and the rail tell of a survey, as this account may see it. */
export function surveyFacts(reader: Reader, survey: SurveyRow, accountId: string): SurveyFacts {
  const { memberId, roles } = standingOf(reader, survey.id, accountId);
  const ownOnly = reach(roles, "survey.see") !== "all";
  const season = seasonInUse(reader, survey.id);
  const cells = cellsInUse(reader, survey.id, season);
  return {
    survey,
    memberId,
    roles,
    ownOnly,
    area: newestArea(reader, survey.id),
    frame: newestFrame(reader, survey.id),
    declarations: declarationsOf(reader, survey.id),
    draws: drawsOf(reader, survey.id),
    season,
    cells: ownOnly ? cells.filter(({ assignment }) => memberId !== null && assignment?.memberId === memberId) : cells,
    keptAt: newestKeptAt(reader, survey.id),
    newestEvent: newestEvent(reader, survey.id),
  };
}

function cellsInUse(reader: Reader, surveyId: string, { live, lists, counts, seasonId }: SeasonInUse): CellInUse[] {
  if (!live) return [];
  const visits = new Map(visitsOn(reader, seasonId, live.draw.frameVersionId).map((visit) => [visit.unit, visit.id]));
  const assignments = new Map(assignmentsOf(reader, surveyId).map((row) => [row.visitId, row]));
  const cells = new Map<number, CellInUse>();
  for (const { unit, position } of lists.flatMap((list) => list.use.inUse)) {
    if (cells.has(unit)) continue;
    const visitId = visits.get(unit);
    const of = <T>(rows: ReadonlyMap<string, T>) => (visitId === undefined ? undefined : rows.get(visitId));
    cells.set(unit, { unit, position, visitId, assignment: of(assignments), count: of(counts) });
  }
  return [...cells.values()];
}

/** Counted, or known not to hold any of the population. */
export const hasValue = ({ count }: CellInUse): boolean => count !== undefined && !isClosing(count.state);

/** Reported as one that can't be counted, and still in use until a lead closes it. */
export const isReported = ({ count }: CellInUse): boolean => count !== undefined && isClosing(count.state);

/** The declaration of the season in use that is neither drawn nor abandoned. */
export function openDeclarationIn({ declarations, season }: SurveyFacts): DeclarationState | undefined {
  return declarations.find(
    (one) => one.declaration.seasonId === season.seasonId && one.drawId === null && one.abandoned === null,
  );
}

/** Whether anything was written down for a cell in use after the newest estimate was kept. */
export function countsSinceKept({ cells, keptAt }: SurveyFacts): boolean {
  return keptAt !== null && cells.some(({ count }) => count !== undefined && count.enteredAt > keptAt);
}
