import { Problem } from "#shared/problem.ts";
import type { Visitor } from "../context.ts";
import { writeTx } from "../db/open.ts";
import { whoseFits } from "./check-password.ts";
import { hashNewPassword } from "./passwords.ts";
import { setPassword } from "./set-password.ts";

interface Change {
  readonly current: string;
  readonly next: string;
  /** The session in which it is changed: the one that stays. */
  readonly sessionId: string;
  readonly source: string;
}

/**
 * Changes one's own password.
 * @throws Problem `password-wrong`, `too-many-requests`, and what the new one lacks
 */
export async function changePassword(ctx: Visitor, { current, next, sessionId, source }: Change): Promise<void> {
  const account = await whoseFits(ctx, { email: ctx.account.email, password: current, source });
  if (!account) throw new Problem("password-wrong", "Enter the password that you sign in with now.");
  const passwordHash = await hashNewPassword(next, account);
  writeTx(ctx.db, (tx) => setPassword(tx, ctx, account, { passwordHash, keepSession: sessionId }));
}
