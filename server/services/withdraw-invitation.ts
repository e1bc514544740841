import { Problem } from "#shared/problem.ts";
import type { Context, Visitor } from "../context.ts";
import { writeTx } from "../db/open.ts";
import { endInvitation } from "./invite.ts";
import { openInvitation } from "./renew-invitation.ts";

/** Ends an invitation that nobody has accepted. */
export function withdrawInvitation(ctx: Context, invitationId: string): void {
  writeTx(ctx.db, (tx) => {
    endInvitation(tx, openInvitation(tx, invitationId), "withdrawnAt", ctx.now().toISOString());
  });
}

/** The same for one to the installation. */
export function withdrawAccountInvitation(ctx: Visitor, invitationId: string): void {
  writeTx(ctx.db, (tx) => {
    const row = openInvitation(tx, invitationId);
    if (row.surveyId !== null) throw new Problem("not-found", "It is one to a survey: its planners can withdraw it.");
    endInvitation(tx, row, "withdrawnAt", ctx.now().toISOString());
  });
}
