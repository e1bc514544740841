import { Problem } from "#shared/problem.ts";
import type { Visitor } from "../context.ts";
import { findAccount, openOwners, updateAccount } from "../db/accounts.ts";
import { openInvitationFor } from "../db/invitations.ts";
import { writeTx } from "../db/open.ts";
import { deleteSessionsOf } from "../db/sessions.ts";
import { endInvitation } from "./invite.ts";
import { endResets } from "./send-reset.ts";

interface Wanted {
  readonly isOwner: boolean;
  readonly closed: boolean;
  /** What the sender saw. */
  readonly seen?: { readonly isOwner: boolean; readonly closed: boolean } | undefined;
}

/**
 * Makes somebody an owner or not, closes their account or opens it again. Closing ends their sessions; their roles stay, and
 * so do their names on records.
 * @throws Problem `account-not-found`; `changed-meanwhile`; `last-owner` where nobody who can sign in would be an owner
 */
export function changeAccount(ctx: Visitor, accountId: string, { isOwner, closed, seen }: Wanted): void {
  writeTx(ctx.db, (tx) => {
    const account = findAccount(tx, accountId);
    if (!account) throw new Problem("account-not-found", "Reload the page.");
    if (seen && (seen.isOwner !== account.isOwner || seen.closed !== (account.closedAt !== null))) {
      throw new Problem("changed-meanwhile", `${account.name}’s account is otherwise by now. Look again, then decide.`);
    }
    const now = ctx.now().toISOString();
    updateAccount(tx, accountId, { isOwner, closedAt: closed ? (account.closedAt ?? now) : null });
    // Thrown inside the transaction, which is taken back then.
    if (openOwners(tx) === 0) throw new Problem("last-owner", "Make somebody else an owner first.");
    // A link sent before must not make somebody an owner whom an owner has decided about since.
    const invited = openInvitationFor(tx, account.email, null);
    if (invited) endInvitation(tx, invited, "withdrawnAt", now);
    if (!closed) return;
    deleteSessionsOf(tx, accountId, null);
    endResets(tx, accountId, now);
  });
}
