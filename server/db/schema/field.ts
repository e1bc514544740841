import { integer, primaryKey, sqliteTable, text, unique } from "drizzle-orm/sqlite-core";
import { members } from "./accounts.ts";
import { draws } from "./draw.ts";
import { frameVersions } from "./frame.ts";
import { seasons, surveys } from "./surveys.ts";

/** One cell to visit in a season, however often it was picked. */
export const visits = sqliteTable(
  "visits",
  {
    id: text().primaryKey(),
    surveyId: text()
      .notNull()
      .references(() => surveys.id),
    seasonId: text()
      .notNull()
      .references(() => seasons.id),
    frameVersionId: text()
      .notNull()
      .references(() => frameVersions.id),
    unit: integer().notNull(),
    column: integer().notNull(),
    row: integer().notNull(),
    openedAt: text().notNull(),
  },
  (t) => [unique("visits_cell").on(t.seasonId, t.frameVersionId, t.unit)],
);

/**
 * Acts that decide which entries are in use, in order (shared/field/in-use.ts): a cell closed, a counted cell amended to
 * a closing state, a closed cell counted after all, entries added. Append-only.
 */
export const pickActs = sqliteTable(
  "pick_acts",
  {
    drawId: text()
      .notNull()
      .references(() => draws.id),
    seasonId: text()
      .notNull()
      .references(() => seasons.id),
    sequence: integer().notNull(),
    kind: text({ enum: ["close", "close-counted", "reopen", "add"] }).notNull(),
    stratum: text().notNull(),
    /** close, close-counted, reopen: the unit whose picks are meant. */
    unit: integer(),
    /** add: how many entries are opened. */
    count: integer(),
    state: text({ enum: ["refused", "unsafe", "not-reached", "lost"] }),
    reason: text().notNull(),
    actedBy: text()
      .notNull()
      .references(() => members.id),
    actedAt: text().notNull(),
  },
  (t) => [primaryKey({ columns: [t.drawId, t.seasonId, t.sequence] })],
);

export const assignments = sqliteTable("assignments", {
  visitId: text()
    .primaryKey()
    .references(() => visits.id),
  memberId: text()
    .notNull()
    .references(() => members.id),
  day: text().notNull(),
  assignedAt: text().notNull(),
});
