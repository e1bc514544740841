import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { openHolders } from "../db/members.ts";
import { deleteEverythingOf } from "../db/delete-survey.ts";
import { newestEvent } from "../db/events.ts";
import { withoutTriggers, writeTx } from "../db/open.ts";
import { findSurvey } from "../db/surveys.ts";
import { queueMail } from "../mail/queue-mail.ts";
import { deletedMail } from "../mail/templates/deleted.ts";

/**
 * Deletes a survey with all that belongs to it. What stays is that it was there and the newest hash of its record, so that
 * a record file that somebody keeps can be told from a made-up one.
 * @throws Problem `name-differs` unless the survey's name was typed as it is
 */
export function deleteSurvey(ctx: Context, typedName: string): void {
  writeTx(ctx.db, (tx) => {
    const survey = findSurvey(tx, ctx.surveyId);
    if (!survey) throw new Problem("survey-not-found", "It has been deleted.");
    if (typedName.trim() !== survey.name) {
      throw new Problem("name-differs", `Type “${survey.name}” as it stands, then delete.`);
    }
    const newest = newestEvent(tx, ctx.surveyId);
    if (!newest) throw new Error(`survey ${ctx.surveyId} has no record`);
    const auditors = openHolders(tx, ctx.surveyId, "auditor");
    withoutTriggers(ctx.db, () => {
      deleteEverythingOf(tx, {
        id: ctx.surveyId,
        newestSequence: newest.sequence,
        newestSha256: newest.sha256,
        deletedAt: ctx.now().toISOString(),
        deletedBy: ctx.account.id,
      });
    });
    const { sequence, sha256 } = newest;
    for (const { name, email } of auditors) {
      queueMail(tx, ctx, {
        kind: "deleted",
        to: { name, address: email },
        surveyId: null,
        secret: false,
        written: deletedMail({ survey: survey.name, by: ctx.account.name, sequence, sha256 }),
      });
    }
  });
}
