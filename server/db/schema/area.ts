import { blob, integer, primaryKey, real, sqliteTable, text, unique } from "drizzle-orm/sqlite-core";
import { members } from "./accounts.ts";
import { surveys } from "./surveys.ts";

/** A study area as it was imported: the bytes as they came, the geometry in its own CRS, the report. Never changed. */
export const areaVersions = sqliteTable(
  "area_versions",
  {
    id: text().primaryKey(),
    surveyId: text()
      .notNull()
      .references(() => surveys.id),
    number: integer().notNull(),
    fileName: text().notNull(),
    fileBytes: blob({ mode: "buffer" }).notNull(),
    fileSha256: text().notNull(),
    /** JSON of an ImportedArea (source CRS), with its format version. */
    geometry: text().notNull(),
    /** JSON of the import report. */
    report: text({ mode: "json" }).notNull(),
    /** JSON of the outline for maps, WGS 84. */
    outline: text({ mode: "json" }).notNull(),
    outlineSimplified: integer({ mode: "boolean" }).notNull(),
    suggestedCrs: text({ mode: "json" }).notNull(),
    importedBy: text()
      .notNull()
      .references(() => members.id),
    createdAt: text().notNull(),
  },
  (t) => [unique("area_versions_number").on(t.surveyId, t.number)],
);

/** Polygons inside an area version: ground to leave out, and strata in list order. */
export const zones = sqliteTable("zones", {
  id: text().primaryKey(),
  areaVersionId: text()
    .notNull()
    .references(() => areaVersions.id),
  kind: text({ enum: ["leave-out", "stratum"] }).notNull(),
  name: text().notNull(),
  position: integer().notNull(),
  reason: text().notNull(),
  geometry: text().notNull(),
  sourceSha256: text(),
  createdAt: text().notNull(),
});

/** The rings of an area on a projected plane: made once, here, and then only read (rule R1). */
export const planes = sqliteTable(
  "planes",
  {
    areaVersionId: text()
      .notNull()
      .references(() => areaVersions.id),
    epsg: integer().notNull(),
    crsName: text().notNull(),
    crsText: text().notNull(),
    /** JSON [polygon][ring][vertex][x, y] in whole millimetres. */
    rings: text().notNull(),
    ringsSha256: text().notNull(),
    planeAreaSquareMetres: real().notNull(),
    geodesicAreaSquareMetres: real().notNull(),
    notes: text({ mode: "json" }).notNull(),
    net: text({ mode: "json" }).notNull(),
    createdAt: text().notNull(),
  },
  (t) => [primaryKey({ columns: [t.areaVersionId, t.epsg] })],
);
