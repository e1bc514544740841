import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import type { StageState, SurveySummary } from "#shared/api/surveys.ts";
import type { OwnersWaiting, WaitingThing } from "#shared/api/waiting.ts";
import type { Visitor } from "../context.ts";
import type { EventRow } from "../db/events.ts";
import type { Reader } from "../db/open.ts";
import {
  findSurvey,
  seasonsOf,
  type SeasonRow,
  type SurveyRow,
  surveysOf,
  surveysWithout,
  type TargetRow,
  targetsOf,
} from "../db/surveys.ts";
import { stageStates } from "./stage-states.ts";
import { type SurveyFacts, surveyFacts } from "./survey-facts.ts";
import { whatWaits, whatWaitsForOwners } from "./what-waits.ts";

export interface SurveyView {
  readonly survey: SurveyRow;
  readonly seasons: readonly SeasonRow[];
  readonly targets: readonly TargetRow[];
  readonly roles: readonly Role[];
  readonly stages: readonly StageState[];
  readonly outline: SurveySummary["outline"];
  readonly memberId: string | null;
}

export interface ListedSurveyView extends SurveyView {
  /** Undefined for those who may not read the record. */
  readonly newestEvent: EventRow | undefined;
  readonly waiting: readonly WaitingThing[];
}

export interface SurveysView {
  readonly surveys: readonly ListedSurveyView[];
  readonly installation: OwnersWaiting | null;
}

/** A survey as this account sees it. Throws "survey-not-found". */
export function readSurvey(reader: Reader, surveyId: string, accountId: string): SurveyView {
  const survey = findSurvey(reader, surveyId);
  if (!survey) throw new Problem("survey-not-found", "Check the address, or choose one from the list of surveys.");
  return viewOf(reader, surveyFacts(reader, survey, accountId));
}

/** The surveys in which somebody holds a role, newest first, with what waits for them. */
export function listSurveys(visitor: Visitor): SurveysView {
  const { db, account, now } = visitor;
  const surveys = surveysOf(db, account.id).map((survey) => {
    const facts = surveyFacts(db, survey, account.id);
    return {
      ...viewOf(db, facts),
      newestEvent: facts.ownOnly ? undefined : facts.newestEvent,
      waiting: whatWaits(db, facts, now()),
    };
  });
  return { surveys, installation: account.isOwner ? whatWaitsForOwners(visitor) : null };
}

/** The surveys in which this account holds no role: an owner finds the people of each by it. Newest first. */
export function listOtherSurveys(reader: Reader, accountId: string): SurveyRow[] {
  return surveysWithout(reader, accountId);
}

function viewOf(reader: Reader, facts: SurveyFacts): SurveyView {
  const { survey, memberId, roles, area } = facts;
  return {
    survey,
    seasons: seasonsOf(reader, survey.id),
    targets: targetsOf(reader, survey.id),
    memberId,
    roles,
    stages: stageStates(facts),
    outline: (area?.outline as SurveySummary["outline"] | undefined) ?? null,
  };
}
