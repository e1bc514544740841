import { and, desc, eq, gt, lte } from "drizzle-orm";
import type { Reader, Tx } from "./open.ts";
import { signInFailures } from "./schema/accounts.ts";

/** The newest failures of an address or of a source since a time: when each was, newest first, at most `most`. */
export function failuresSince(
  reader: Reader,
  of: { readonly email: string } | { readonly source: string },
  since: string,
  most: number,
): string[] {
  const whose = "email" in of ? eq(signInFailures.email, of.email) : eq(signInFailures.source, of.source);
  return reader
    .select({ at: signInFailures.at })
    .from(signInFailures)
    .where(and(whose, gt(signInFailures.at, since)))
    .orderBy(desc(signInFailures.at), desc(signInFailures.id))
    .limit(most)
    .all()
    .map((row) => row.at);
}

export function insertFailure(tx: Tx, row: Omit<typeof signInFailures.$inferInsert, "id">): void {
  tx.insert(signInFailures).values(row).run();
}

export function deleteFailuresOf(reader: Reader, email: string): void {
  reader.delete(signInFailures).where(eq(signInFailures.email, email)).run();
}

export function deleteFailuresBefore(tx: Tx, at: string): void {
  tx.delete(signInFailures).where(lte(signInFailures.at, at)).run();
}
