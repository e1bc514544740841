import { and, desc, eq, getTableColumns, isNull } from "drizzle-orm";
import type { FrameSpec, FrameSummary } from "#shared/api/frame.ts";
import type { Reader, Tx } from "./open.ts";
import { frameVersions } from "./schema/frame.ts";

export type FrameRow = typeof frameVersions.$inferSelect;

const { cells, statement, ...headColumns } = getTableColumns(frameVersions);
/** A frame version without its packed cells and its statement, which may be large. */
export type FrameHead = Omit<FrameRow, "cells" | "statement">;

export const specOf = (frame: Pick<FrameRow, "spec">): FrameSpec => frame.spec as FrameSpec;
export const summaryOf = (frame: Pick<FrameRow, "summary">): FrameSummary => frame.summary as FrameSummary;

/** Newest first; a draft, where there is one, is the first. */
export function framesOf(reader: Reader, surveyId: string): FrameHead[] {
  return reader
    .select(headColumns)
    .from(frameVersions)
    .where(eq(frameVersions.surveyId, surveyId))
    .orderBy(desc(frameVersions.number))
    .all();
}

/** How the newest version stands. */
export function newestFrame(reader: Reader, surveyId: string): Pick<FrameRow, "number" | "sealedAt"> | undefined {
  return reader
    .select({ number: frameVersions.number, sealedAt: frameVersions.sealedAt })
    .from(frameVersions)
    .where(eq(frameVersions.surveyId, surveyId))
    .orderBy(desc(frameVersions.number))
    .limit(1)
    .get();
}

export function findFrameHead(reader: Reader, id: string): FrameHead | undefined {
  return reader.select(headColumns).from(frameVersions).where(eq(frameVersions.id, id)).get();
}

/** A frame with its statement and cells. */
export function findFrame(reader: Reader, id: string): FrameRow | undefined {
  return reader.select().from(frameVersions).where(eq(frameVersions.id, id)).get();
}

export function insertFrame(tx: Tx, row: FrameRow): void {
  tx.insert(frameVersions).values(row).run();
}

export function updateDraft(tx: Tx, id: string, draft: Pick<FrameRow, "areaVersionId" | "spec" | "draftSha256">): void {
  const done = tx
    .update(frameVersions)
    .set(draft)
    .where(and(eq(frameVersions.id, id), isNull(frameVersions.sealedAt)))
    .run();
  if (done.changes !== 1) throw new Error(`frame ${id} is no draft`);
}

type Seal = Pick<
  FrameRow,
  "statement" | "frameSha256" | "listSha256" | "units" | "cells" | "cellsFormat" | "summary" | "sealedAt" | "sealedBy"
>;

/** Returns false when somebody sealed it first. */
export function markSealed(tx: Tx, id: string, seal: Seal): boolean {
  const done = tx
    .update(frameVersions)
    .set(seal)
    .where(and(eq(frameVersions.id, id), isNull(frameVersions.sealedAt)))
    .run();
  return done.changes === 1;
}
