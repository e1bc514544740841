import { and, count, eq, gt, isNull, lte } from "drizzle-orm";
import type { Reader, Tx } from "./open.ts";
import { passwordResets } from "./schema/accounts.ts";

export type ResetRow = typeof passwordResets.$inferSelect;

export function insertReset(tx: Tx, row: ResetRow): void {
  tx.insert(passwordResets).values(row).run();
}

/** By the hash of the link's secret; used and expired ones too. */
export function findResetByLink(reader: Reader, secretSha256: string): ResetRow | undefined {
  return reader.select().from(passwordResets).where(eq(passwordResets.secretSha256, secretSha256)).get();
}

export function resetsSince(reader: Reader, accountId: string, since: string): number {
  const row = reader
    .select({ resets: count() })
    .from(passwordResets)
    .where(and(eq(passwordResets.accountId, accountId), gt(passwordResets.createdAt, since)))
    .get();
  return row?.resets ?? 0;
}

export function markResetUsed(tx: Tx, id: string, at: string): void {
  tx.update(passwordResets).set({ usedAt: at }).where(eq(passwordResets.id, id)).run();
}

/** Lets the links of an account that were not used expire now, and returns them. */
export function expireResets(tx: Tx, accountId: string, now: string): ResetRow[] {
  const working = and(
    eq(passwordResets.accountId, accountId),
    isNull(passwordResets.usedAt),
    gt(passwordResets.expiresAt, now),
  );
  return tx.update(passwordResets).set({ expiresAt: now }).where(working).returning().all();
}

export function deleteResetsBefore(tx: Tx, createdAt: string): void {
  tx.delete(passwordResets).where(lte(passwordResets.createdAt, createdAt)).run();
}
