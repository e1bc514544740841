import type { Platform } from "../context.ts";
import { type AccountRow, updateAccount } from "../db/accounts.ts";
import type { Tx } from "../db/open.ts";
import { deleteSessionsOf } from "../db/sessions.ts";
import { deleteFailuresOf } from "../db/sign-in-failures.ts";
import { endResets } from "./send-reset.ts";

interface NewPassword {
  readonly passwordHash: string;
  /** The one session that stays; null for none. */
  readonly keepSession: string | null;
}

/** A new password ends every other session, every link to set one, and the wait after wrong ones. */
export function setPassword(
  tx: Tx,
  platform: Pick<Platform, "now">,
  account: AccountRow,
  { passwordHash, keepSession }: NewPassword,
): void {
  updateAccount(tx, account.id, { passwordHash });
  deleteSessionsOf(tx, account.id, keepSession);
  deleteFailuresOf(tx, account.email);
  endResets(tx, account.id, platform.now().toISOString());
}
