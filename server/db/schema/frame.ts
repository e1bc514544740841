import { sql } from "drizzle-orm";
import { blob, check, integer, sqliteTable, text, unique } from "drizzle-orm/sqlite-core";
import { members } from "./accounts.ts";
import { areaVersions } from "./area.ts";
import { surveys } from "./surveys.ts";

/**
 * Frame versions. A draft holds what the planner set; sealing fills the rest, once, and triggers keep it from then on.
 * The cells are one packed blob of runs (never a row a cell), with the version of its format.
 */
export const frameVersions = sqliteTable(
  "frame_versions",
  {
    id: text().primaryKey(),
    surveyId: text()
      .notNull()
      .references(() => surveys.id),
    number: integer().notNull(),
    areaVersionId: text()
      .notNull()
      .references(() => areaVersions.id),
    kind: text({ enum: ["grid", "polygons"] }).notNull(),
    /** JSON of the FrameSpec. */
    spec: text({ mode: "json" }).notNull(),
    draftSha256: text().notNull(),
    statement: text(),
    frameSha256: text(),
    listSha256: text(),
    units: integer(),
    cells: blob({ mode: "buffer" }),
    cellsFormat: integer(),
    summary: text({ mode: "json" }),
    sealedAt: text(),
    sealedBy: text().references(() => members.id),
    createdAt: text().notNull(),
  },
  (t) => [
    unique("frame_versions_number").on(t.surveyId, t.number),
    check(
      "frame_versions_sealed_whole",
      sql`${t.sealedAt} is null or (${t.statement} is not null and ${t.frameSha256} is not null and ${t.listSha256} is not null and ${t.units} is not null and ${t.cells} is not null and ${t.cellsFormat} is not null and ${t.sealedBy} is not null)`,
    ),
  ],
);
