import { Problem } from "#shared/problem.ts";
import type { Platform } from "../context.ts";
import { findAccountByEmail, insertAccount } from "../db/accounts.ts";
import { writeTx } from "../db/open.ts";
import { newId } from "./new-id.ts";
import { hashPassword } from "./passwords.ts";

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
  const passwordHash = await hashPassword(wanted.password);
  return writeTx(platform.db, (tx) => {
    if (findAccountByEmail(tx, email)) {
      throw new Problem("account-exists", `${email} has an account: use it, or another address.`);
    }
    const id = newId(platform);
    const createdAt = platform.now().toISOString();
    insertAccount(tx, {
      id,
      email,
      name: wanted.name.trim(),
      passwordHash,
      isOwner: wanted.isOwner,
      createdAt,
      closedAt: null,
    });
    return id;
  });
}
