import type { Role } from "#shared/access/table.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { type AccountRow, findAccountByEmail } from "../db/accounts.ts";
import { openInvitationFor } from "../db/invitations.ts";
import { standingOf } from "../db/members.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { actingOnPeople, giveRole } from "./give-role.ts";
import { endInvitation, invite, reinvite } from "./invite.ts";
import { tellAdded } from "./tell-roles.ts";

interface Wanted {
  readonly email: string;
  readonly role: Role;
}

/**
 * Gives somebody a role of the survey: at once where the address has an account, by invitation where it has none.
 * @throws Problem `member-exists`, `invitation-exists`, `account-closed`
 */
export function addPerson(ctx: Context, wanted: Wanted): void {
  const { role } = wanted;
  const email = wanted.email.toLowerCase();
  writeTx(ctx.db, (tx) => {
    const account = findAccountByEmail(tx, email);
    const invited = openInvitationFor(tx, email, { surveyId: ctx.surveyId, role });
    if (account) {
      addNow(tx, ctx, account, role);
      if (invited) endInvitation(tx, invited, "withdrawnAt", ctx.now().toISOString());
    } else if (!invited) {
      invite(tx, ctx, { email, to: { surveyId: ctx.surveyId, role }, makesOwner: false });
    } else if (invited.expiresAt <= ctx.now().toISOString()) {
      reinvite(tx, ctx, invited);
    } else {
      throw new Problem(
        "invitation-exists",
        `${email} is invited as ${role} and has not answered yet. Send a new link from the list of those who are invited.`,
      );
    }
  });
}

function addNow(tx: Tx, ctx: Context, account: AccountRow, role: Role): void {
  expectOpenAccount(account);
  if (standingOf(tx, ctx.surveyId, account.id).roles.includes(role)) {
    throw new Problem("member-exists", `${account.email} is ${role} here. Choose another role or address.`);
  }
  giveRole(tx, ctx, { surveyId: ctx.surveyId, account, role, by: actingOnPeople(tx, ctx) });
  tellAdded(tx, ctx, account, role);
}

/** @throws Problem `account-closed` */
export function expectOpenAccount(account: AccountRow): void {
  if (account.closedAt === null) return;
  throw new Problem("account-closed", "An owner of this installation can open it again.");
}
