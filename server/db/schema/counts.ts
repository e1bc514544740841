import { sql } from "drizzle-orm";
import { type AnySQLiteColumn, check, integer, real, sqliteTable, text, uniqueIndex } from "drizzle-orm/sqlite-core";
import { members } from "./accounts.ts";
import { visits } from "./field.ts";
import { surveys, targets } from "./surveys.ts";

/** A table of counts that was read in: kept by hash, so that the same file twice is recognised. */
export const countImports = sqliteTable("count_imports", {
  id: text().primaryKey(),
  surveyId: text()
    .notNull()
    .references(() => surveys.id),
  fileName: text().notNull(),
  sha256: text().notNull(),
  columns: text({ mode: "json" }).notNull(),
  written: integer().notNull(),
  importedBy: text()
    .notNull()
    .references(() => members.id),
  importedAt: text().notNull(),
});

/** All that was ever written down for a cell. Append-only: an amendment is a new entry that names what it replaces. */
export const countEntries = sqliteTable(
  "count_entries",
  {
    /** Made by the client, so that an entry that is sent twice is kept once. */
    id: text().primaryKey(),
    visitId: text()
      .notNull()
      .references(() => visits.id),
    targetId: text()
      .notNull()
      .references(() => targets.id),
    /** Who counted. */
    observerId: text()
      .notNull()
      .references(() => members.id),
    purpose: text({ enum: ["first", "recount", "pass", "other-observer"] }).notNull(),
    state: text({ enum: ["counted", "not-in-population", "refused", "unsafe", "not-reached", "lost"] }).notNull(),
    value: real(),
    replaces: text().references((): AnySQLiteColumn => countEntries.id),
    reason: text().notNull(),
    note: text().notNull(),
    importId: text().references(() => countImports.id),
    /** Who wrote it down here. */
    enteredBy: text()
      .notNull()
      .references(() => members.id),
    enteredAt: text().notNull(),
    madeAt: text().notNull(),
  },
  (t) => [
    check("count_entries_value", sql`(${t.state} = 'counted') = (${t.value} is not null)`),
    check("count_entries_not_negative", sql`${t.value} is null or ${t.value} >= 0`),
    /** One first count a cell and target; later ones replace it. */
    uniqueIndex("count_entries_first")
      .on(t.visitId, t.targetId)
      .where(sql`purpose = 'first' and replaces is null`),
    uniqueIndex("count_entries_replaces")
      .on(t.replaces)
      .where(sql`replaces is not null`),
  ],
);
