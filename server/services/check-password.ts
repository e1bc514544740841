import { Problem } from "#shared/problem.ts";
import type { Platform } from "../context.ts";
import { type AccountRow, findAccountByEmail } from "../db/accounts.ts";
import { deleteFailuresOf } from "../db/sign-in-failures.ts";
import { type Attempt, expectAttempt } from "./expect-attempt.ts";
import { decoyHash, passwordFits } from "./passwords.ts";

let decoy: Promise<string> | undefined;

type Tried = Attempt & { readonly password: string };

/** Who this is, or one refusal for an unknown address, a wrong password and a closed account alike. */
export async function checkPassword(platform: Platform, tried: Tried): Promise<AccountRow> {
  const account = await whoseFits(platform, tried);
  if (account) return account;
  throw new Problem("sign-in-refused", "Check both and try again; an owner of this installation can help.");
}

/**
 * The account that an address and a password belong to, or null, which counts against the limits.
 * @throws Problem `too-many-requests`
 */
export async function whoseFits(platform: Platform, { password, ...attempt }: Tried): Promise<AccountRow | null> {
  const email = attempt.email.toLowerCase();
  expectAttempt(platform, { ...attempt, email });
  const account = findAccountByEmail(platform.db, email);
  decoy ??= decoyHash(platform.random);
  const fits = await passwordFits(account?.passwordHash ?? (await decoy), password);
  if (!account || !fits || account.closedAt !== null) return null;
  deleteFailuresOf(platform.db, email);
  return account;
}
