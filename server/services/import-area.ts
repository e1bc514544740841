import type { AreaAnswers } from "#shared/area/questions.ts";
import type { Context } from "../context.ts";
import { type AreaHead, areasOf, findAreaHead, insertArea } from "../db/areas.ts";
import { writeTx } from "../db/open.ts";
import { actingMember } from "./acting-member.ts";
import { newId } from "./new-id.ts";
import { recordEvent } from "./record-event.ts";

interface AreaFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

/**
 * Reads a boundary file in a worker and keeps it as the next version of the study area: bytes as they came, geometry in its
 * own system, report. What the file leaves open is asked by the refusal "area-question"; nothing is kept then.
 */
export async function importArea(
  ctx: Context,
  file: AreaFile,
  answers: AreaAnswers,
  signal: AbortSignal,
): Promise<AreaHead> {
  const memberId = actingMember(ctx);
  const read = await ctx.jobs.run("read-area", { name: file.name, bytes: file.bytes, answers }, signal);
  return writeTx(ctx.db, (tx) => {
    const at = ctx.now().toISOString();
    const id = newId(ctx);
    const number = (areasOf(tx, ctx.surveyId)[0]?.number ?? 0) + 1;
    insertArea(tx, {
      id,
      surveyId: ctx.surveyId,
      number,
      fileName: file.name,
      fileBytes: Buffer.from(file.bytes),
      fileSha256: read.report.sha256,
      geometry: read.geometry,
      report: read.report,
      outline: read.outline,
      outlineSimplified: read.outlineSimplified,
      suggestedCrs: read.suggestedCrs,
      importedBy: memberId,
      createdAt: at,
    });
    recordEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId,
      kind: "area-imported",
      payload: {
        version: 1,
        areaId: id,
        number,
        fileName: file.name,
        fileSha256: read.report.sha256,
        sourceCrs: read.report.crs.text,
        vertices: read.report.vertices,
        geodesicAreaM2: read.report.geodesicAreaM2,
        mended: read.report.mended,
      },
    });
    const kept = findAreaHead(tx, id);
    if (!kept) throw new Error(`area ${id} was not kept`);
    return kept;
  });
}
