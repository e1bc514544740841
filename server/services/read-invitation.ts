import type { Platform } from "../context.ts";
import { type AccountRow, findAccount, findAccountByEmail } from "../db/accounts.ts";
import { findInvitationByLink, type InvitationRow } from "../db/invitations.ts";
import type { Reader } from "../db/open.ts";
import { findSurvey, type SurveyRow } from "../db/surveys.ts";
import { linkEnded, linkSha256 } from "./links.ts";

export interface InvitationFound {
  readonly invitation: InvitationRow;
  /** Null: to the installation. */
  readonly survey: SurveyRow | null;
  readonly invitedBy: string;
  /** The address has an account by now. */
  readonly account: AccountRow | null;
}

/**
 * What a link invites to.
 * @throws Problem `link-ended`
 */
export function readInvitation(platform: Pick<Platform, "now">, reader: Reader, secret: string): InvitationFound {
  const invitation = findInvitationByLink(reader, linkSha256(secret));
  if (!invitation || invitation.acceptedAt !== null || invitation.withdrawnAt !== null) throw linkEnded("invitation");
  if (invitation.expiresAt <= platform.now().toISOString()) throw linkEnded("invitation");
  return {
    invitation,
    survey: (invitation.surveyId !== null && findSurvey(reader, invitation.surveyId)) || null,
    invitedBy: findAccount(reader, invitation.invitedBy)?.name ?? "",
    account: findAccountByEmail(reader, invitation.email) ?? null,
  };
}
