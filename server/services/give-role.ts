import type { Role } from "#shared/access/table.ts";
import type { AccountRow } from "../db/accounts.ts";
import type { Context } from "../context.ts";
import { endMembership, findMember, insertMember, upsertMembership } from "../db/members.ts";
import type { Tx } from "../db/open.ts";
import { newId } from "./new-id.ts";
import { recordEvent } from "./record-event.ts";
import type { Telling } from "./tell-auditors.ts";

interface RoleChange {
  readonly surveyId: string;
  readonly account: Pick<AccountRow, "id" | "name">;
  readonly role: Role;
  /** Who acts; null: the person themself. */
  readonly by: string | null;
}

/** Gives a role, with its event; the first one makes the person's opaque id. Returns that id. */
export function giveRole(tx: Tx, platform: Telling, { surveyId, account, role, by }: RoleChange): string {
  const at = platform.now().toISOString();
  const member = memberIdOf(tx, platform, surveyId, account.id);
  upsertMembership(tx, member, role, at);
  recordEvent(tx, platform, {
    surveyId,
    at,
    memberId: by ?? member,
    kind: "member-added",
    payload: { version: 1, member, name: account.name, role },
  });
  return member;
}

/** Ends a role, with its event. Cells stay assigned to whoever held it until somebody else is given them. */
export function endRole(tx: Tx, platform: Telling, { surveyId, account, role, by }: RoleChange): void {
  const at = platform.now().toISOString();
  const member = memberIdOf(tx, platform, surveyId, account.id);
  endMembership(tx, member, role, at);
  recordEvent(tx, platform, {
    surveyId,
    at,
    memberId: by ?? member,
    kind: "role-ended",
    payload: { version: 1, member, name: account.name, role },
  });
}

/** Whoever acts on the people of a survey: an owner without a role gets an opaque id and no role, since the record names who acted. */
export function actingOnPeople(tx: Tx, ctx: Context): string {
  return memberIdOf(tx, ctx, ctx.surveyId, ctx.account.id);
}

function memberIdOf(tx: Tx, platform: Telling, surveyId: string, accountId: string): string {
  const known = findMember(tx, surveyId, accountId);
  if (known) return known.id;
  const id = newId(platform);
  insertMember(tx, { id, surveyId, accountId, addedAt: platform.now().toISOString() });
  return id;
}
