import { Problem } from "#shared/problem.ts";
import type { Platform, Visitor } from "../context.ts";
import { type AccountRow, findAccount, findAccountByEmail } from "../db/accounts.ts";
import { aboutLink } from "../db/invitations.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { expireResets, insertReset, resetsSince } from "../db/password-resets.ts";
import { queueMail } from "../mail/queue-mail.ts";
import { emptyMailsAbout } from "../mail/send-queue.ts";
import { RESET, resetMail } from "../mail/templates/reset.ts";
import { expectOpenAccount } from "./add-person.ts";
import { linkTo } from "./link-to.ts";
import { newLink, utcWords } from "./links.ts";
import { newId } from "./new-id.ts";

const HOUR_MS = 3600_000;
const RESET_MS = 2 * HOUR_MS;

/** More mails within an hour to one address would only bury the others. */
const RESETS_AN_HOUR = 3;

/** Longer than the work takes for an address that has an account, so that the time does not tell which has one. */
const ANSWER_AFTER_MS = 150;

/** Sends a link to set a new password where the address has an account; answers alike, and after as long, where it has none. */
export async function requestReset(platform: Platform, email: string): Promise<void> {
  const waited = new Promise((resolve) => setTimeout(resolve, ANSWER_AFTER_MS));
  writeTx(platform.db, (tx) => {
    const account = findAccountByEmail(tx, email);
    if (!account || account.closedAt !== null || hadEnough(tx, platform, account)) return;
    mailReset(tx, platform, account);
  });
  await waited;
}

/**
 * The same at an owner's wish, who is told why not.
 * @throws Problem `account-not-found`, `account-closed`, `too-many-requests`
 */
export function sendReset(ctx: Visitor, accountId: string): void {
  writeTx(ctx.db, (tx) => {
    const account = findAccount(tx, accountId);
    if (!account) throw new Problem("account-not-found", "Reload the page.");
    expectOpenAccount(account);
    if (hadEnough(tx, ctx, account)) {
      const most = `${account.email} was sent ${RESETS_AN_HOUR} links within an hour.`;
      throw new Problem("too-many-requests", `${most} The newest of them works; or wait an hour.`);
    }
    mailReset(tx, ctx, account);
  });
}

function hadEnough(tx: Tx, platform: Platform, account: AccountRow): boolean {
  const since = new Date(platform.now().getTime() - HOUR_MS).toISOString();
  return resetsSince(tx, account.id, since) >= RESETS_AN_HOUR;
}

/** A new link ends those before. */
function mailReset(tx: Tx, platform: Platform, account: AccountRow): void {
  const now = platform.now();
  endResets(tx, account.id, now.toISOString());
  const { secret, secretSha256 } = newLink(platform);
  const expiresAt = new Date(now.getTime() + RESET_MS).toISOString();
  insertReset(tx, {
    id: newId(platform),
    accountId: account.id,
    secretSha256,
    createdAt: now.toISOString(),
    expiresAt,
    usedAt: null,
  });
  queueMail(tx, platform, {
    kind: RESET,
    to: { name: account.name, address: account.email },
    surveyId: null,
    about: aboutLink(secretSha256),
    secret: true,
    written: resetMail({ link: linkTo(tx, platform, `/reset/${secret}`), expires: utcWords(expiresAt) }),
  });
}

/** Lets every link of an account end that was not used, and takes them out of their mails. */
export function endResets(tx: Tx, accountId: string, now: string): void {
  for (const { secretSha256 } of expireResets(tx, accountId, now)) emptyMailsAbout(tx, aboutLink(secretSha256));
}
