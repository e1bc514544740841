import type { Role } from "#shared/access/table.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { findAccount, findAccountByEmail } from "../db/accounts.ts";
import { appendEvent } from "../db/events.ts";
import { findMember, insertMember, standingOf, upsertMembership } from "../db/members.ts";
import { writeTx } from "../db/open.ts";
import { createAccount } from "./create-account.ts";
import { newId } from "./new-id.ts";

interface NewMember {
  readonly email: string;
  readonly role: Role;
  readonly newAccount?: { readonly name: string; readonly password: string } | undefined;
}

/** Gives somebody a role in the survey; makes their account first where a name and a first password are given. */
export async function addMember(ctx: Context, wanted: NewMember): Promise<void> {
  const known = findAccountByEmail(ctx.db, wanted.email);
  if (!known && !wanted.newAccount) {
    throw new Problem("account-not-found", "Give a name and a first password, and the account is made with the role.");
  }
  if (known && wanted.newAccount) {
    throw new Problem("account-exists", "Leave name and first password empty: this person signs in as before.");
  }
  const accountId = known?.id ?? (await createAccount(ctx, { ...needed(wanted), email: wanted.email, isOwner: false }));
  writeTx(ctx.db, (tx) => {
    const at = ctx.now().toISOString();
    if (standingOf(tx, ctx.surveyId, accountId).roles.includes(wanted.role)) {
      throw new Problem("member-exists", `${wanted.email} is ${wanted.role} here. Choose another role or address.`);
    }
    const account = findAccount(tx, accountId);
    if (!account) throw new Error(`account ${accountId} vanished`);
    const memberId = findMember(tx, ctx.surveyId, accountId)?.id ?? newId(ctx);
    if (!findMember(tx, ctx.surveyId, accountId)) {
      insertMember(tx, { id: memberId, surveyId: ctx.surveyId, accountId, addedAt: at });
    }
    upsertMembership(tx, memberId, wanted.role, at);
    appendEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId: ctx.memberId ?? actingOwner(tx, ctx, at),
      kind: "member-added",
      payload: { version: 1, member: memberId, name: account.name, role: wanted.role },
    });
  });
}

function needed(wanted: NewMember): { name: string; password: string } {
  if (!wanted.newAccount) throw new Error("no account was asked for");
  return wanted.newAccount;
}

/** An owner without a role who adds people gets an opaque id here, with no role: the record must name who acted. */
function actingOwner(tx: Parameters<typeof insertMember>[0], ctx: Context, at: string): string {
  const known = findMember(tx, ctx.surveyId, ctx.account.id);
  if (known) return known.id;
  const id = newId(ctx);
  insertMember(tx, { id, surveyId: ctx.surveyId, accountId: ctx.account.id, addedAt: at });
  return id;
}
