import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { findOpenInvitation, type InvitationRow } from "../db/invitations.ts";
import { type Reader, writeTx } from "../db/open.ts";
import { reinvite } from "./invite.ts";

/** Sends a new link, with its own time to expire; the old link ends. */
export function renewInvitation(ctx: Context, invitationId: string): void {
  writeTx(ctx.db, (tx) => reinvite(tx, ctx, openInvitation(tx, invitationId)));
}

/** @throws Problem `not-found` where it was accepted or withdrawn meanwhile */
export function openInvitation(reader: Reader, id: string): InvitationRow {
  const row = findOpenInvitation(reader, id);
  if (row) return row;
  throw new Problem("not-found", "This invitation was accepted or withdrawn meanwhile. Reload the page.");
}
