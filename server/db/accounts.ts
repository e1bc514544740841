import { and, asc, count, countDistinct, eq, isNull, max } from "drizzle-orm";
import type { Reader, Tx } from "./open.ts";
import { accounts, members, memberships, sessions } from "./schema/accounts.ts";

export type AccountRow = typeof accounts.$inferSelect;

export function insertAccount(reader: Reader, row: AccountRow): void {
  reader.insert(accounts).values(row).run();
}

export function findAccount(reader: Reader, id: string): AccountRow | undefined {
  return reader.select().from(accounts).where(eq(accounts.id, id)).get();
}

/** E-mail addresses are kept in lower case. */
export function findAccountByEmail(reader: Reader, email: string): AccountRow | undefined {
  return reader.select().from(accounts).where(eq(accounts.email, email.toLowerCase())).get();
}

export function anyAccount(reader: Reader): boolean {
  return reader.select({ id: accounts.id }).from(accounts).limit(1).get() !== undefined;
}

export function updateAccount(tx: Tx, id: string, change: Partial<Omit<AccountRow, "id">>): void {
  tx.update(accounts).set(change).where(eq(accounts.id, id)).run();
}

/** How many owners can sign in. */
export function openOwners(reader: Reader): number {
  const row = reader
    .select({ owners: count() })
    .from(accounts)
    .where(and(eq(accounts.isOwner, true), isNull(accounts.closedAt)))
    .get();
  return row?.owners ?? 0;
}

export interface AccountInUse extends AccountRow {
  readonly lastSeenAt: string | null;
  /** In how many surveys this person holds a role. */
  readonly surveys: number;
}

/** Every account, oldest first. */
export function allAccounts(reader: Reader): AccountInUse[] {
  const seen = reader
    .select({ id: sessions.accountId, at: max(sessions.lastSeenAt) })
    .from(sessions)
    .groupBy(sessions.accountId)
    .all();
  const held = reader
    .select({ id: members.accountId, surveys: countDistinct(members.surveyId) })
    .from(members)
    .innerJoin(memberships, eq(memberships.memberId, members.id))
    .where(isNull(memberships.removedAt))
    .groupBy(members.accountId)
    .all();
  const seenAt = new Map(seen.map((row) => [row.id, row.at]));
  const surveys = new Map(held.map((row) => [row.id, row.surveys]));
  return reader
    .select()
    .from(accounts)
    .orderBy(asc(accounts.createdAt), asc(accounts.id))
    .all()
    .map((row) => ({ ...row, lastSeenAt: seenAt.get(row.id) ?? null, surveys: surveys.get(row.id) ?? 0 }));
}
