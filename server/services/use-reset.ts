import type { Platform } from "../context.ts";
import { type AccountRow, findAccount } from "../db/accounts.ts";
import { aboutLink } from "../db/invitations.ts";
import { type Reader, writeTx } from "../db/open.ts";
import { findResetByLink, markResetUsed, type ResetRow } from "../db/password-resets.ts";
import { emptyMailsAbout } from "../mail/send-queue.ts";
import { linkEnded, linkSha256 } from "./links.ts";
import { hashNewPassword } from "./passwords.ts";
import { setPassword } from "./set-password.ts";

interface ResetFound {
  readonly reset: ResetRow;
  readonly account: AccountRow;
}

/**
 * Whose password a link sets.
 * @throws Problem `link-ended`
 */
export function readReset(platform: Pick<Platform, "now">, reader: Reader, secret: string): ResetFound {
  const reset = findResetByLink(reader, linkSha256(secret));
  if (!reset || reset.usedAt !== null || reset.expiresAt <= platform.now().toISOString()) throw linkEnded("reset");
  const account = findAccount(reader, reset.accountId);
  if (!account || account.closedAt !== null) throw linkEnded("reset");
  return { reset, account };
}

/**
 * Sets a new password by a link and ends every session of the account. Returns the account.
 * @throws Problem `link-ended`, and what the password lacks
 */
export async function useReset(platform: Platform, secret: string, password: string): Promise<AccountRow> {
  const { account: before } = readReset(platform, platform.db, secret);
  const passwordHash = await hashNewPassword(password, before);
  return writeTx(platform.db, (tx) => {
    const { reset, account } = readReset(platform, tx, secret); // another click may have used it meanwhile
    markResetUsed(tx, reset.id, platform.now().toISOString());
    emptyMailsAbout(tx, aboutLink(reset.secretSha256));
    setPassword(tx, platform, account, { passwordHash, keepSession: null });
    return { ...account, passwordHash };
  });
}
