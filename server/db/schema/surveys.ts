import { integer, sqliteTable, text, unique } from "drizzle-orm/sqlite-core";

export const surveys = sqliteTable("surveys", {
  id: text().primaryKey(),
  name: text().notNull(),
  /** IANA name: days are those of the people there. */
  timeZone: text().notNull(),
  /** Confidence level as decimal text: "0.95". */
  level: text().notNull(),
  sensitivity: text({ enum: ["open", "low", "medium", "high"] }).notNull(),
  safetyNotes: text().notNull(),
  createdAt: text().notNull(),
  archivedAt: text(),
});

export const seasons = sqliteTable(
  "seasons",
  {
    id: text().primaryKey(),
    surveyId: text()
      .notNull()
      .references(() => surveys.id),
    position: integer().notNull(),
    name: text().notNull(),
    startsOn: text(),
    endsOn: text(),
    createdAt: text().notNull(),
  },
  (t) => [unique("seasons_order").on(t.surveyId, t.position)],
);

/** What is counted. Several targets may be counted on the same visits, each with its own estimate. */
export const targets = sqliteTable(
  "targets",
  {
    id: text().primaryKey(),
    surveyId: text()
      .notNull()
      .references(() => surveys.id),
    position: integer().notNull(),
    singular: text().notNull(),
    plural: text().notNull(),
    countingRule: text().notNull(),
    wholeNumbers: integer({ mode: "boolean" }).notNull(),
  },
  (t) => [unique("targets_order").on(t.surveyId, t.position)],
);
