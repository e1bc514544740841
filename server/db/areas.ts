import { and, desc, eq } from "drizzle-orm";
import type { Reader, Tx } from "./open.ts";
import { areaVersions, planes } from "./schema/area.ts";

export type AreaRow = typeof areaVersions.$inferSelect;
export type PlaneRow = typeof planes.$inferSelect;

const withoutBytes = {
  id: areaVersions.id,
  surveyId: areaVersions.surveyId,
  number: areaVersions.number,
  fileName: areaVersions.fileName,
  fileSha256: areaVersions.fileSha256,
  report: areaVersions.report,
  outline: areaVersions.outline,
  outlineSimplified: areaVersions.outlineSimplified,
  suggestedCrs: areaVersions.suggestedCrs,
  importedBy: areaVersions.importedBy,
  createdAt: areaVersions.createdAt,
};
/** An area version without the file and the geometry, which may be large. */
export type AreaHead = Omit<AreaRow, "fileBytes" | "geometry">;

export function insertArea(tx: Tx, row: AreaRow): void {
  tx.insert(areaVersions).values(row).run();
}

/** Newest first. */
export function areasOf(reader: Reader, surveyId: string): AreaHead[] {
  return reader
    .select(withoutBytes)
    .from(areaVersions)
    .where(eq(areaVersions.surveyId, surveyId))
    .orderBy(desc(areaVersions.number))
    .all();
}

export function findAreaHead(reader: Reader, id: string): AreaHead | undefined {
  return reader.select(withoutBytes).from(areaVersions).where(eq(areaVersions.id, id)).get();
}

export function areaGeometry(reader: Reader, id: string): string | undefined {
  return reader.select({ geometry: areaVersions.geometry }).from(areaVersions).where(eq(areaVersions.id, id)).get()
    ?.geometry;
}

export function areaFile(reader: Reader, id: string): { name: string; bytes: Buffer } | undefined {
  return reader
    .select({ name: areaVersions.fileName, bytes: areaVersions.fileBytes })
    .from(areaVersions)
    .where(eq(areaVersions.id, id))
    .get();
}

export function newestArea(reader: Reader, surveyId: string): AreaHead | undefined {
  return reader
    .select(withoutBytes)
    .from(areaVersions)
    .where(eq(areaVersions.surveyId, surveyId))
    .orderBy(desc(areaVersions.number))
    .limit(1)
    .get();
}

export function findPlane(reader: Reader, areaId: string, epsg: number): PlaneRow | undefined {
  return reader
    .select()
    .from(planes)
    .where(and(eq(planes.areaVersionId, areaId), eq(planes.epsg, epsg)))
    .get();
}

/** Keeps a plane; the first one made stays where two were made at once. */
export function keepPlane(tx: Tx, row: PlaneRow): void {
  tx.insert(planes).values(row).onConflictDoNothing().run();
}
