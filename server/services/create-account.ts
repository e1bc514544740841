import { Problem } from "#shared/problem.ts";
import type { Platform } from "../context.ts";
import { type AccountRow, findAccountByEmail, insertAccount } from "../db/accounts.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { newId } from "./new-id.ts";
import { hashNewPassword } from "./passwords.ts";

interface NewAccount {
  readonly email: string;
  readonly name: string;
  readonly password: string;
  readonly isOwner: boolean;
}

/** Makes an account; the address must be free. Returns its id. */
export async function createAccount(
  platform: Pick<Platform, "db" | "now" | "random">,
  wanted: NewAccount,
): Promise<string> {
  const email = wanted.email.trim().toLowerCase();
  const name = wanted.name.trim();
  const passwordHash = await hashNewPassword(wanted.password, { name, email });
  return writeTx(platform.db, (tx) => {
    if (findAccountByEmail(tx, email)) {
      throw new Problem("account-exists", `${email} has an account: use it, or another address.`);
    }
    return addAccount(tx, platform, { email, name, passwordHash, isOwner: wanted.isOwner }).id;
  });
}

/** Writes an open account, in the transaction of what it is made for. */
export function addAccount(
  tx: Tx,
  platform: Pick<Platform, "now" | "random">,
  made: Pick<AccountRow, "email" | "name" | "passwordHash" | "isOwner">,
): AccountRow {
  const row = { id: newId(platform), ...made, createdAt: platform.now().toISOString(), closedAt: null };
  insertAccount(tx, row);
  return row;
}
