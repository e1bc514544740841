import { and, eq, isNull } from "drizzle-orm";
import type { Role } from "#shared/access/table.ts";
import type { Reader, Tx } from "./open.ts";
import { accounts, members, memberships } from "./schema/accounts.ts";

interface Standing {
  readonly memberId: string | null;
  readonly roles: readonly Role[];
}

/** How an account stands in a survey: its opaque member id and the roles held now. */
export function standingOf(reader: Reader, surveyId: string, accountId: string): Standing {
  const rows = reader
    .select({ memberId: members.id, role: memberships.role })
    .from(members)
    .innerJoin(memberships, eq(memberships.memberId, members.id))
    .where(and(eq(members.surveyId, surveyId), eq(members.accountId, accountId), isNull(memberships.removedAt)))
    .all();
  return { memberId: rows[0]?.memberId ?? null, roles: rows.map((row) => row.role) };
}

export function findMember(reader: Reader, surveyId: string, accountId: string) {
  return reader
    .select()
    .from(members)
    .where(and(eq(members.surveyId, surveyId), eq(members.accountId, accountId)))
    .get();
}

export function insertMember(tx: Tx, row: typeof members.$inferSelect): void {
  tx.insert(members).values(row).run();
}

/** Gives a role, or gives it again to somebody who had lost it. */
export function upsertMembership(tx: Tx, memberId: string, role: Role, addedAt: string): void {
  tx.insert(memberships)
    .values({ memberId, role, addedAt, removedAt: null })
    .onConflictDoUpdate({ target: [memberships.memberId, memberships.role], set: { addedAt, removedAt: null } })
    .run();
}

export function endMembership(tx: Tx, memberId: string, role: Role, removedAt: string): void {
  tx.update(memberships)
    .set({ removedAt })
    .where(and(eq(memberships.memberId, memberId), eq(memberships.role, role)))
    .run();
}

/** Under which opaque ids the records of surveys name an account, also of surveys that this person left. */
export function membersOfAccount(reader: Reader, accountId: string) {
  return reader.select().from(members).where(eq(members.accountId, accountId)).orderBy(members.addedAt).all();
}

export function accountOfMember(reader: Reader, memberId: string): string | undefined {
  return reader.select({ id: members.accountId }).from(members).where(eq(members.id, memberId)).get()?.id;
}

/** Somebody who holds a role and can sign in. */
export interface HolderRow {
  readonly accountId: string;
  readonly memberId: string;
  readonly name: string;
  readonly email: string;
  /** Since when this person holds the role. */
  readonly since: string;
}

/** Who holds a role in a survey, in the order in which it was given: neither those removed nor those whose account is closed. */
export function openHolders(reader: Reader, surveyId: string, role: Role): HolderRow[] {
  return reader
    .select({
      accountId: accounts.id,
      memberId: members.id,
      name: accounts.name,
      email: accounts.email,
      since: memberships.addedAt,
    })
    .from(members)
    .innerJoin(accounts, eq(accounts.id, members.accountId))
    .innerJoin(memberships, eq(memberships.memberId, members.id))
    .where(
      and(
        eq(members.surveyId, surveyId),
        eq(memberships.role, role),
        isNull(memberships.removedAt),
        isNull(accounts.closedAt),
      ),
    )
    .orderBy(memberships.addedAt, members.id)
    .all();
}

export interface MemberRow {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly addedAt: string;
  readonly role: Role;
  /** Since when the person can't sign in any more; null for everybody who can. */
  readonly closedAt: string | null;
}

/** One row a role, in the order in which people were added. */
export function membersOf(reader: Reader, surveyId: string): MemberRow[] {
  return reader
    .select({
      id: members.id,
      name: accounts.name,
      email: accounts.email,
      addedAt: members.addedAt,
      role: memberships.role,
      closedAt: accounts.closedAt,
    })
    .from(members)
    .innerJoin(accounts, eq(accounts.id, members.accountId))
    .innerJoin(memberships, eq(memberships.memberId, members.id))
    .where(and(eq(members.surveyId, surveyId), isNull(memberships.removedAt)))
    .orderBy(members.addedAt, members.id)
    .all();
}

/** Names for the opaque ids of a survey's record. */
export function memberNames(reader: Reader, surveyId: string): Map<string, string> {
  const rows = reader
    .select({ id: members.id, name: accounts.name })
    .from(members)
    .innerJoin(accounts, eq(accounts.id, members.accountId))
    .where(eq(members.surveyId, surveyId))
    .all();
  return new Map(rows.map((row) => [row.id, row.name]));
}

/** Whether anybody who can sign in holds a role in a survey. */
export function isRoleHeld(reader: Reader, surveyId: string, role: Role): boolean {
  const found = reader
    .select({ id: members.id })
    .from(members)
    .innerJoin(accounts, eq(accounts.id, members.accountId))
    .innerJoin(memberships, eq(memberships.memberId, members.id))
    .where(
      and(
        eq(members.surveyId, surveyId),
        eq(memberships.role, role),
        isNull(memberships.removedAt),
        isNull(accounts.closedAt),
      ),
    )
    .limit(1)
    .get();
  return found !== undefined;
}
