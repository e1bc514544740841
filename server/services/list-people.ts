import type { Context } from "../context.ts";
import { type InvitationSent, openInvitations } from "../db/invitations.ts";
import { type MemberRow, membersOf } from "../db/members.ts";

export interface PeopleFound {
  /** One row a role. */
  readonly members: readonly MemberRow[];
  readonly invitations: readonly InvitationSent[];
}

export function listPeople(ctx: Context): PeopleFound {
  return { members: membersOf(ctx.db, ctx.surveyId), invitations: openInvitations(ctx.db, ctx.surveyId) };
}
