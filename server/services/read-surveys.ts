import { Problem } from "#shared/problem.ts";
import type { Role } from "#shared/access/table.ts";
import type { StageState, SurveySummary } from "#shared/api/surveys.ts";
import { newestOutline } from "../db/areas.ts";
import { standingOf } from "../db/members.ts";
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

export interface SurveyView {
  readonly survey: SurveyRow;
  readonly seasons: readonly SeasonRow[];
  readonly targets: readonly TargetRow[];
  readonly roles: readonly Role[];
  readonly stages: readonly StageState[];
  readonly outline: SurveySummary["outline"];
  readonly memberId: string | null;
}

/** A survey as this account sees it. Throws "survey-not-found". */
export function readSurvey(reader: Reader, surveyId: string, accountId: string): SurveyView {
  const survey = findSurvey(reader, surveyId);
  if (!survey) throw new Problem("survey-not-found", "Check the address, or choose one from the list of surveys.");
  return viewOf(reader, survey, accountId);
}

/** The surveys in which this account holds a role, newest first. */
export function listSurveys(reader: Reader, accountId: string): SurveyView[] {
  return surveysOf(reader, accountId).map((survey) => viewOf(reader, survey, accountId));
}

/** The surveys in which this account holds no role: an owner finds the people of each by it. Newest first. */
export function listOtherSurveys(reader: Reader, accountId: string): SurveyRow[] {
  return surveysWithout(reader, accountId);
}

function viewOf(reader: Reader, survey: SurveyRow, accountId: string): SurveyView {
  return {
    survey,
    seasons: seasonsOf(reader, survey.id),
    targets: targetsOf(reader, survey.id),
    ...standingOf(reader, survey.id, accountId),
    stages: stageStates(reader, survey.id),
    outline: newestOutline(reader, survey.id),
  };
}
