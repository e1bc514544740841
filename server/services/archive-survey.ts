import type { Context } from "../context.ts";
import { writeTx } from "../db/open.ts";
import { setArchivedAt } from "../db/settings.ts";
import { isArchived } from "../db/surveys.ts";
import { actingMember } from "./acting-member.ts";
import { recordEvent } from "./record-event.ts";

/** Puts a survey away: it can be read and takes nothing new. Where it is put away already, nothing happens. */
export function archiveSurvey(ctx: Context): void {
  put(ctx, true);
}

/** Takes a survey out of the archive. Where it is not in there, nothing happens. */
export function unarchiveSurvey(ctx: Context): void {
  put(ctx, false);
}

function put(ctx: Context, archived: boolean): void {
  const memberId = actingMember(ctx);
  writeTx(ctx.db, (tx) => {
    if (isArchived(tx, ctx.surveyId) === archived) return;
    const at = ctx.now().toISOString();
    setArchivedAt(tx, ctx.surveyId, archived ? at : null);
    recordEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId,
      kind: archived ? "survey-archived" : "survey-unarchived",
      payload: { version: 1 },
    });
  });
}
