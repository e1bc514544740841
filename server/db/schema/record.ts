import { integer, primaryKey, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { members } from "./accounts.ts";
import { seasons, surveys, targets } from "./surveys.ts";

/** The record of a survey: one row an event, chained and signed (rule R8). Append-only. */
export const events = sqliteTable(
  "events",
  {
    surveyId: text()
      .notNull()
      .references(() => surveys.id),
    sequence: integer().notNull(),
    at: text().notNull(),
    memberId: text()
      .notNull()
      .references(() => members.id),
    kind: text().notNull(),
    previousSha256: text().notNull(),
    salt: text().notNull(),
    /** JSON of the payload; hashed together with the salt in its RFC 8785 form. */
    payload: text().notNull(),
    payloadSha256: text().notNull(),
    sha256: text().notNull().unique(),
    signature: text().notNull(),
  },
  (t) => [primaryKey({ columns: [t.surveyId, t.sequence] })],
);

/** Estimates that were kept or printed, as they were. Append-only. */
export const keptEstimates = sqliteTable("kept_estimates", {
  id: text().primaryKey(),
  surveyId: text()
    .notNull()
    .references(() => surveys.id),
  seasonId: text()
    .notNull()
    .references(() => seasons.id),
  targetId: text()
    .notNull()
    .references(() => targets.id),
  settings: text({ mode: "json" }).notNull(),
  result: text({ mode: "json" }).notNull(),
  keptBy: text()
    .notNull()
    .references(() => members.id),
  keptAt: text().notNull(),
});
