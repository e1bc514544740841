import type { Tx } from "./open.ts";
import { mails } from "./schema/mail.ts";

export type MailRow = typeof mails.$inferSelect;

/** A second mail about the same is not written. */
export function insertMail(tx: Tx, row: MailRow): void {
  tx.insert(mails).values(row).onConflictDoNothing({ target: mails.about }).run();
}
