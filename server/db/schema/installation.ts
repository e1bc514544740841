import { sql } from "drizzle-orm";
import { check, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { accounts } from "./accounts.ts";

/** One row: what the owner sets for everybody. */
export const installation = sqliteTable(
  "installation",
  {
    id: integer().primaryKey(),
    /** The address that links in mails begin with: "https://surveys.example.org". Null until the owner sets it. */
    publicAddress: text(),
    /** XYZ template with {z}, {x}, {y}, and what its makers want to be named as; null for no base map. */
    baseMapUrl: text(),
    baseMapAttribution: text(),
  },
  (t) => [check("installation_one_row", sql`${t.id} = 1`)],
);

/** What is left of a deleted survey: that it was there, what it stood on, and the newest hash of its record. */
export const deletedSurveys = sqliteTable("deleted_surveys", {
  id: text().primaryKey(),
  newestSequence: integer().notNull(),
  newestSha256: text().notNull(),
  /** SHA-256 of its boundary files and of its sealed frames: other records still count it (rule R7). */
  sourceSha256s: text({ mode: "json" }).$type<string[]>().notNull().default([]),
  frameSha256s: text({ mode: "json" }).$type<string[]>().notNull().default([]),
  deletedAt: text().notNull(),
  deletedBy: text()
    .notNull()
    .references(() => accounts.id),
});
