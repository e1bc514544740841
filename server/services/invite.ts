import type { Role } from "#shared/access/table.ts";
import { Problem } from "#shared/problem.ts";
import { keyFingerprint, publicKeyOf } from "#shared/record/sign.ts";
import type { Visitor } from "../context.ts";
import { aboutLink, insertInvitation, invitationsBy, type InvitationRow, updateInvitation } from "../db/invitations.ts";
import type { Tx } from "../db/open.ts";
import { findSurvey } from "../db/surveys.ts";
import { queueMail } from "../mail/queue-mail.ts";
import { emptyMailsAbout } from "../mail/send-queue.ts";
import { invitationMail } from "../mail/templates/invitation.ts";
import { linkTo } from "./link-to.ts";
import { newLink, utcWords } from "./links.ts";
import { newId } from "./new-id.ts";

const INVITATION_MS = 14 * 24 * 3600_000;

interface Wanted {
  readonly email: string;
  readonly to: { readonly surveyId: string; readonly role: Role } | null;
  readonly makesOwner: boolean;
}

/** More than anybody invites in a day who does not write to strangers. */
const INVITATIONS_A_DAY = 100;
const DAY_MS = 24 * 3600_000;

/**
 * Writes an invitation and its mail.
 * @throws Problem `too-many-requests` after a hundred in a day from one account
 */
export function invite(tx: Tx, ctx: Visitor, { email, to, makesOwner }: Wanted): void {
  const dayAgo = new Date(ctx.now().getTime() - DAY_MS).toISOString();
  if (invitationsBy(tx, ctx.account.id, dayAgo) >= INVITATIONS_A_DAY) {
    throw new Problem("too-many-requests", `You invited ${INVITATIONS_A_DAY} people within a day. Go on tomorrow.`);
  }
  const { secret, ...fresh } = freshLink(ctx);
  const row: InvitationRow = {
    id: newId(ctx),
    surveyId: to?.surveyId ?? null,
    role: to?.role ?? null,
    makesOwner,
    email,
    ...fresh,
    acceptedAt: null,
    withdrawnAt: null,
  };
  insertInvitation(tx, row);
  mailInvitation(tx, ctx, row, secret);
}

/** Gives an open invitation a new link with its own time to expire, from whoever renews it; the old link ends. */
export function reinvite(tx: Tx, ctx: Visitor, before: InvitationRow, change: { makesOwner?: boolean } = {}): void {
  emptyMailsAbout(tx, aboutLink(before.secretSha256));
  const { secret, ...fresh } = freshLink(ctx);
  const row = { ...before, ...change, ...fresh };
  updateInvitation(tx, before.id, row);
  mailInvitation(tx, ctx, row, secret);
}

/** Ends an open invitation: withdrawn, or nothing is left to be accepted. */
export function endInvitation(tx: Tx, row: InvitationRow, how: "acceptedAt" | "withdrawnAt", at: string): void {
  updateInvitation(tx, row.id, { [how]: at });
  emptyMailsAbout(tx, aboutLink(row.secretSha256));
}

function freshLink(ctx: Visitor) {
  const now = ctx.now();
  return {
    ...newLink(ctx),
    invitedBy: ctx.account.id,
    createdAt: now.toISOString(),
    expiresAt: new Date(now.getTime() + INVITATION_MS).toISOString(),
  };
}

function mailInvitation(tx: Tx, ctx: Visitor, row: InvitationRow, secret: string): void {
  const survey = row.surveyId === null ? undefined : findSurvey(tx, row.surveyId);
  queueMail(tx, ctx, {
    kind: "invitation",
    to: { name: "", address: row.email },
    surveyId: row.surveyId,
    about: aboutLink(row.secretSha256),
    secret: true,
    written: invitationMail({
      invitedBy: ctx.account.name,
      to: survey && row.role ? { survey: survey.name, role: row.role } : null,
      makesOwner: row.makesOwner,
      link: linkTo(tx, ctx, `/invitation/${secret}`),
      expires: utcWords(row.expiresAt),
      keyFingerprint: keyFingerprint(publicKeyOf(ctx.signingKey)),
    }),
  });
}
