import type { Invitation, InvitationSeen, Member, People } from "#shared/api/people.ts";
import { keyFingerprint, publicKeyOf } from "#shared/record/sign.ts";
import type { Platform, Visitor } from "../context.ts";
import type { InvitationSent } from "../db/invitations.ts";
import type { MemberRow } from "../db/members.ts";
import type { PeopleFound } from "../services/list-people.ts";
import type { InvitationFound } from "../services/read-invitation.ts";

export function presentPeople(ctx: Visitor, { members, invitations }: PeopleFound): People {
  const now = ctx.now().toISOString();
  return {
    members: presentMembers(members, ctx.account.email),
    invitations: invitations.map((sent) => presentInvitation(sent, now)),
  };
}

/** One entry a person, with the roles held now. */
function presentMembers(rows: readonly MemberRow[], ownEmail: string): Member[] {
  const people = new Map<string, Member>();
  for (const { id, name, email, addedAt, role, closedAt } of rows) {
    const known = people.get(id);
    if (known) known.roles.push(role);
    else
      people.set(id, {
        id,
        name,
        email,
        addedAt,
        roles: [role],
        isSelf: email === ownEmail,
        isClosed: closedAt !== null,
      });
  }
  return [...people.values()];
}

function presentInvitation({ invitation, invitedBy, mail }: InvitationSent, now: string): Invitation {
  const { id, email, role, createdAt, expiresAt } = invitation;
  if (role === null) throw new RangeError(`invitation ${id} is to no survey`);
  // Its mail may be gone after a long time; then it was sent.
  return { id, email, role, invitedBy, createdAt, expiresAt, expired: expiresAt <= now, mail: mail ?? "sent" };
}

export function presentInvitationSeen(platform: Platform, found: InvitationFound): InvitationSeen {
  const { email, role, makesOwner, expiresAt } = found.invitation;
  return {
    email,
    survey: found.survey?.name ?? null,
    role,
    makesOwner,
    invitedBy: found.invitedBy,
    expiresAt,
    hasAccount: found.account !== null,
    keyFingerprint: keyFingerprint(publicKeyOf(platform.signingKey)),
  };
}
