import { sql } from "drizzle-orm";
import { integer, primaryKey, sqliteTable, text, unique, uniqueIndex } from "drizzle-orm/sqlite-core";
import { members } from "./accounts.ts";
import { frameVersions } from "./frame.ts";
import { seasons, surveys } from "./surveys.ts";

/** What was declared before the seed existed. Append-only: how it ended stands in its own tables. */
export const declarations = sqliteTable("declarations", {
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
  /** The declaration as it was hashed (RFC 8785). */
  text: text().notNull(),
  sha256: text().notNull(),
  declaredBy: text()
    .notNull()
    .references(() => members.id),
  declaredAt: text().notNull(),
});

export const declarationsAbandoned = sqliteTable("declarations_abandoned", {
  declarationId: text()
    .primaryKey()
    .references(() => declarations.id),
  reason: text().notNull(),
  abandonedBy: text()
    .notNull()
    .references(() => members.id),
  abandonedAt: text().notNull(),
});

/** The seed of a declaration, as text; made once. */
export const seeds = sqliteTable("seeds", {
  declarationId: text()
    .primaryKey()
    .references(() => declarations.id),
  text: text().notNull(),
  source: text({ enum: ["made-here", "typed", "dice", "two-parts", "pulse"] }).notNull(),
  givenBy: text()
    .notNull()
    .references(() => members.id),
  givenAt: text().notNull(),
});

export const draws = sqliteTable(
  "draws",
  {
    id: text().primaryKey(),
    surveyId: text()
      .notNull()
      .references(() => surveys.id),
    number: integer().notNull(),
    declarationId: text()
      .notNull()
      .unique()
      .references(() => declarations.id),
    frameVersionId: text()
      .notNull()
      .references(() => frameVersions.id),
    drawnBy: text()
      .notNull()
      .references(() => members.id),
    drawnAt: text().notNull(),
  },
  (t) => [unique("draws_number").on(t.surveyId, t.number)],
);

/** The list of a draw, one row an entry, in stream order within its stratum. Holds no counts. */
export const drawEntries = sqliteTable(
  "draw_entries",
  {
    drawId: text()
      .notNull()
      .references(() => draws.id),
    stratum: text().notNull(),
    position: integer().notNull(),
    unit: integer().notNull(),
    column: integer().notNull(),
    row: integer().notNull(),
    label: text().notNull(),
    repeatOf: integer(),
    reserve: integer({ mode: "boolean" }).notNull(),
  },
  (t) => [primaryKey({ columns: [t.drawId, t.stratum, t.position] })],
);

export const drawsWithdrawn = sqliteTable("draws_withdrawn", {
  drawId: text()
    .primaryKey()
    .references(() => draws.id),
  reason: text().notNull(),
  withdrawnBy: text()
    .notNull()
    .references(() => members.id),
  withdrawnAt: text().notNull(),
});

/** Which draw a season uses; it may be an earlier season's. At most one is live (not ended) a season. */
export const seasonDraws = sqliteTable(
  "season_draws",
  {
    id: text().primaryKey(),
    seasonId: text()
      .notNull()
      .references(() => seasons.id),
    drawId: text()
      .notNull()
      .references(() => draws.id),
    takenAt: text().notNull(),
    endedAt: text(),
  },
  (t) => [
    uniqueIndex("season_draws_live")
      .on(t.seasonId)
      .where(sql`ended_at is null`),
  ],
);
