import type { listAccounts } from "#shared/api/installation.ts";
import type * as z from "zod/mini";
import type { Visitor } from "../context.ts";
import { allAccounts } from "../db/accounts.ts";
import { openInvitations } from "../db/invitations.ts";

type Accounts = z.input<(typeof listAccounts)["answer"]["schema"]>;

/** Every account of the installation and everybody who is invited, for an owner. */
export function presentAccounts(ctx: Visitor): Accounts {
  const now = ctx.now().toISOString();
  return {
    accounts: allAccounts(ctx.db).map(({ id, name, email, isOwner, createdAt, lastSeenAt, closedAt, surveys }) => ({
      ...{ id, name, email, isOwner, createdAt, lastSeenAt, closedAt, surveys },
      isSelf: id === ctx.account.id,
    })),
    invitations: openInvitations(ctx.db, null).map(({ invitation, survey }) => ({
      id: invitation.id,
      email: invitation.email,
      survey,
      makesOwner: invitation.makesOwner,
      expiresAt: invitation.expiresAt,
      expired: invitation.expiresAt <= now,
    })),
  };
}
