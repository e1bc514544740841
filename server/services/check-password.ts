import { Problem } from "#shared/problem.ts";
import type { Platform, Visitor } from "../context.ts";
import { findAccountByEmail } from "../db/accounts.ts";
import { hashPassword, passwordFits } from "./passwords.ts";

/** A hash that no password fits, so that an unknown address takes as long to refuse as a wrong password. */
let decoy: Promise<string> | undefined;

/** Who this is, or one refusal for an unknown address and a wrong password alike. */
export async function checkPassword(platform: Platform, email: string, password: string): Promise<Visitor["account"]> {
  const account = findAccountByEmail(platform.db, email);
  decoy ??= hashPassword(Buffer.from(platform.random(24)).toString("hex"));
  const fits = await passwordFits(account?.passwordHash ?? (await decoy), password);
  if (!account || !fits) {
    throw new Problem("sign-in-refused", "Check both and try again; an owner of this installation can help.");
  }
  return { id: account.id, name: account.name, email: account.email, isOwner: account.isOwner };
}
