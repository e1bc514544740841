import { and, desc, eq, gt, isNull, lte, ne } from "drizzle-orm";
import type { Reader, Tx } from "./open.ts";
import { accounts, sessions } from "./schema/accounts.ts";

export type SessionRow = typeof sessions.$inferSelect;

export function insertSession(reader: Reader, row: SessionRow): void {
  reader.insert(sessions).values(row).run();
}

export function deleteSession(reader: Reader, id: string): void {
  reader.delete(sessions).where(eq(sessions.id, id)).run();
}

/** The account of a session that has not expired, unless it is closed. */
export function findSession(reader: Reader, id: string, now: string) {
  return reader
    .select({
      id: accounts.id,
      name: accounts.name,
      email: accounts.email,
      isOwner: accounts.isOwner,
      lastSeenAt: sessions.lastSeenAt,
    })
    .from(sessions)
    .innerJoin(accounts, eq(accounts.id, sessions.accountId))
    .where(and(eq(sessions.id, id), gt(sessions.expiresAt, now), isNull(accounts.closedAt)))
    .get();
}

export function setLastSeen(reader: Reader, id: string, at: string): void {
  reader.update(sessions).set({ lastSeenAt: at }).where(eq(sessions.id, id)).run();
}

/** Sessions of an account that have not expired, the latest used first. */
export function sessionsOf(reader: Reader, accountId: string, now: string): SessionRow[] {
  return reader
    .select()
    .from(sessions)
    .where(and(eq(sessions.accountId, accountId), gt(sessions.expiresAt, now)))
    .orderBy(desc(sessions.lastSeenAt), desc(sessions.createdAt))
    .all();
}

/** Ends every session of an account, but one where it is given. */
export function deleteSessionsOf(tx: Tx, accountId: string, but: string | null): void {
  const theirs = eq(sessions.accountId, accountId);
  tx.delete(sessions)
    .where(but === null ? theirs : and(theirs, ne(sessions.id, but)))
    .run();
}

export function deleteEverySession(tx: Tx): void {
  tx.delete(sessions).run();
}

export function deleteExpiredSessions(tx: Tx, now: string): void {
  tx.delete(sessions).where(lte(sessions.expiresAt, now)).run();
}
