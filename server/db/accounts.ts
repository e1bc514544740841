import { and, eq, gt } from "drizzle-orm";
import type { Reader } from "./open.ts";
import { accounts, sessions } from "./schema/accounts.ts";

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

export function insertSession(reader: Reader, row: typeof sessions.$inferSelect): void {
  reader.insert(sessions).values(row).run();
}

export function deleteSession(reader: Reader, id: string): void {
  reader.delete(sessions).where(eq(sessions.id, id)).run();
}

/** The account of a session that has not expired. */
export function findSession(reader: Reader, id: string, now: string) {
  return reader
    .select({ id: accounts.id, name: accounts.name, email: accounts.email, isOwner: accounts.isOwner })
    .from(sessions)
    .innerJoin(accounts, eq(accounts.id, sessions.accountId))
    .where(and(eq(sessions.id, id), gt(sessions.expiresAt, now)))
    .get();
}
