import type { Context } from "../context.ts";
import { standingOf } from "../db/members.ts";
import { writeTx } from "../db/open.ts";
import { endRole } from "./give-role.ts";
import { expectAnotherPlanner } from "./set-roles.ts";

/**
 * Gives up every role in the survey.
 * @throws Problem `last-planner`
 */
export function leaveSurvey(ctx: Context): void {
  const { surveyId, account } = ctx;
  writeTx(ctx.db, (tx) => {
    const { roles } = standingOf(tx, surveyId, account.id);
    if (roles.includes("planner")) expectAnotherPlanner(tx, surveyId, account);
    for (const role of roles) endRole(tx, ctx, { surveyId, account, role, by: null });
  });
}
