import { Problem } from "#shared/problem.ts";
import type { Visitor } from "../context.ts";
import { insertMember, upsertMembership } from "../db/members.ts";
import { writeTx } from "../db/open.ts";
import { insertSurvey } from "../db/surveys.ts";
import { isTimeZone } from "./local-day.ts";
import { newId } from "./new-id.ts";
import { recordEvent } from "./record-event.ts";

interface NewSurvey {
  readonly name: string;
  readonly targetSingular: string;
  readonly targetPlural: string;
  readonly countingRule: string;
  readonly wholeNumbers: boolean;
  readonly seasonName: string;
  readonly timeZone: string;
  readonly safetyNotes: string;
}

/**
 * Starts a survey with one season and one target; whoever starts it is its planner. Returns its id.
 * @throws Problem `input-invalid` for a time zone that nobody knows
 */
export function createSurvey(visitor: Visitor, wanted: NewSurvey): string {
  if (!isTimeZone(wanted.timeZone)) {
    throw new Problem("input-invalid", `“${wanted.timeZone}” is no time zone. Give one such as Europe/London.`);
  }
  const at = visitor.now().toISOString();
  const surveyId = newId(visitor);
  const memberId = newId(visitor);
  const season = { id: newId(visitor), name: wanted.seasonName };
  const target = {
    id: newId(visitor),
    singular: wanted.targetSingular,
    plural: wanted.targetPlural,
    countingRule: wanted.countingRule,
    wholeNumbers: wanted.wholeNumbers,
  };
  const level = "0.95";
  writeTx(visitor.db, (tx) => {
    insertSurvey(
      tx,
      {
        id: surveyId,
        name: wanted.name,
        timeZone: wanted.timeZone,
        level,
        sensitivity: "open",
        safetyNotes: wanted.safetyNotes,
        createdAt: at,
        archivedAt: null,
      },
      { ...season, surveyId, position: 1, startsOn: null, endsOn: null, createdAt: at },
      { ...target, surveyId, position: 1 },
    );
    insertMember(tx, { id: memberId, surveyId, accountId: visitor.account.id, addedAt: at });
    upsertMembership(tx, memberId, "planner", at);
    recordEvent(tx, visitor, {
      surveyId,
      at,
      memberId,
      kind: "survey-created",
      payload: { version: 1, name: wanted.name, target, season, timeZone: wanted.timeZone, level },
    });
    recordEvent(tx, visitor, {
      surveyId,
      at,
      memberId,
      kind: "member-added",
      payload: { version: 1, member: memberId, name: visitor.account.name, role: "planner" },
    });
  });
  return surveyId;
}
