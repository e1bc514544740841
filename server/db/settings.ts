import { and, eq, isNull, sql } from "drizzle-orm";
import { alias } from "drizzle-orm/sqlite-core";
import type { SurveySettings } from "#shared/api/settings.ts";
import type { Reader, Tx } from "./open.ts";
import { countEntries } from "./schema/counts.ts";
import { seasons, surveys, targets } from "./schema/surveys.ts";

/** Writes the settings of a survey, of its season in work and of its targets, which are named by their ids. */
export function updateSettings(tx: Tx, surveyId: string, settings: SurveySettings): void {
  const { name, timeZone, level, sensitivity, safetyNotes } = settings;
  tx.update(surveys).set({ name, timeZone, level, sensitivity, safetyNotes }).where(eq(surveys.id, surveyId)).run();
  const { id, ...season } = settings.season;
  tx.update(seasons)
    .set(season)
    .where(and(eq(seasons.id, id), eq(seasons.surveyId, surveyId)))
    .run();
  for (const { id: targetId, ...target } of settings.targets) {
    tx.update(targets)
      .set(target)
      .where(and(eq(targets.id, targetId), eq(targets.surveyId, surveyId)))
      .run();
  }
}

/** Puts a survey into the archive, or takes it out (null). */
export function setArchivedAt(tx: Tx, surveyId: string, archivedAt: string | null): void {
  tx.update(surveys).set({ archivedAt }).where(eq(surveys.id, surveyId)).run();
}

const later = alias(countEntries, "later");

/** How many counts of a target that nothing has replaced are no whole numbers. */
export function fractionsInForce(reader: Reader, targetId: string): number {
  const found = reader
    .select({ fractions: sql<number>`count(*)` })
    .from(countEntries)
    .leftJoin(later, eq(later.replaces, countEntries.id))
    .where(
      and(
        eq(countEntries.targetId, targetId),
        isNull(later.id),
        sql`${countEntries.value} <> round(${countEntries.value})`,
      ),
    )
    .get();
  return found?.fractions ?? 0;
}
