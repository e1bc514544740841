import { and, asc, desc, eq, isNull, notInArray } from "drizzle-orm";
import { Problem } from "#shared/problem.ts";
import type { Reader, Tx } from "./open.ts";
import { members, memberships } from "./schema/accounts.ts";
import { seasons, surveys, targets } from "./schema/surveys.ts";

export type SurveyRow = typeof surveys.$inferSelect;
export type SeasonRow = typeof seasons.$inferSelect;
export type TargetRow = typeof targets.$inferSelect;

export function insertSurvey(tx: Tx, row: SurveyRow, season: SeasonRow, target: TargetRow): void {
  tx.insert(surveys).values(row).run();
  tx.insert(seasons).values(season).run();
  tx.insert(targets).values(target).run();
}

export function findSurvey(reader: Reader, id: string): SurveyRow | undefined {
  return reader.select().from(surveys).where(eq(surveys.id, id)).get();
}

export function isArchived(reader: Reader, id: string): boolean {
  return (findSurvey(reader, id)?.archivedAt ?? null) !== null;
}

/** @throws Problem `survey-archived`: what is archived can be read, and taken out of the archive */
export function expectInWork(reader: Reader, id: string): void {
  if (!isArchived(reader, id)) return;
  throw new Problem(
    "survey-archived",
    "It can be read and takes nothing new. A planner can take it out of the archive.",
  );
}

/** The surveys in which an account holds a role, archived ones too, newest first. */
export function surveysOf(reader: Reader, accountId: string): SurveyRow[] {
  return reader
    .selectDistinct({ survey: surveys })
    .from(surveys)
    .innerJoin(members, eq(members.surveyId, surveys.id))
    .innerJoin(memberships, eq(memberships.memberId, members.id))
    .where(and(eq(members.accountId, accountId), isNull(memberships.removedAt)))
    .orderBy(desc(surveys.createdAt))
    .all()
    .map((row) => row.survey);
}

/** Every survey, archived ones too, oldest first. */
export function allSurveys(reader: Reader): SurveyRow[] {
  return reader.select().from(surveys).orderBy(asc(surveys.createdAt), asc(surveys.id)).all();
}

/** The surveys in which this account holds no role, newest first. */
export function surveysWithout(reader: Reader, accountId: string): SurveyRow[] {
  const held = reader
    .select({ surveyId: members.surveyId })
    .from(members)
    .innerJoin(memberships, eq(memberships.memberId, members.id))
    .where(and(eq(members.accountId, accountId), isNull(memberships.removedAt)));
  return reader
    .select()
    .from(surveys)
    .where(and(notInArray(surveys.id, held), isNull(surveys.archivedAt)))
    .orderBy(desc(surveys.createdAt))
    .all();
}

export function seasonsOf(reader: Reader, surveyId: string): SeasonRow[] {
  return reader.select().from(seasons).where(eq(seasons.surveyId, surveyId)).orderBy(asc(seasons.position)).all();
}

/** The season in work: the last one. */
export function currentSeason(reader: Reader, surveyId: string): SeasonRow {
  const last = seasonsOf(reader, surveyId).at(-1);
  if (!last) throw new Error(`survey ${surveyId} has no season`);
  return last;
}

export function targetsOf(reader: Reader, surveyId: string): TargetRow[] {
  return reader.select().from(targets).where(eq(targets.surveyId, surveyId)).orderBy(asc(targets.position)).all();
}
