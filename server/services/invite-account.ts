import { Problem } from "#shared/problem.ts";
import type { Visitor } from "../context.ts";
import { findAccountByEmail } from "../db/accounts.ts";
import { openInvitationFor } from "../db/invitations.ts";
import { writeTx } from "../db/open.ts";
import { invite, reinvite } from "./invite.ts";

/**
 * Invites somebody to the installation, without a survey yet; done again, it sends a new link and ends the one before.
 * @throws Problem `account-exists`
 */
export function inviteAccount(ctx: Visitor, wanted: { readonly email: string; readonly makesOwner: boolean }): void {
  const { makesOwner } = wanted;
  const email = wanted.email.toLowerCase();
  writeTx(ctx.db, (tx) => {
    if (findAccountByEmail(tx, email)) {
      throw new Problem("account-exists", `${email} is in the list of accounts: make them an owner there.`);
    }
    const before = openInvitationFor(tx, email, null);
    if (before) reinvite(tx, ctx, before, { makesOwner });
    else invite(tx, ctx, { email, to: null, makesOwner });
  });
}
