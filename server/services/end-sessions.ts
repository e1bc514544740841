import { createHash } from "node:crypto";
import { Problem } from "#shared/problem.ts";
import type { Platform, Visitor } from "../context.ts";
import { writeTx } from "../db/open.ts";
import { deleteResetsBefore } from "../db/password-resets.ts";
import { deleteExpiredSessions, deleteSession, deleteSessionsOf, type SessionRow, sessionsOf } from "../db/sessions.ts";
import { deleteFailuresBefore } from "../db/sign-in-failures.ts";
import { LIMIT_WINDOW_MS } from "./expect-attempt.ts";

/** The name of a session in a list: its id is the secret of its cookie and goes nowhere else. */
export function sessionHandle(sessionId: string): string {
  return createHash("sha256").update(sessionId).digest("hex");
}

export function listSessions(ctx: Visitor): SessionRow[] {
  return sessionsOf(ctx.db, ctx.account.id, ctx.now().toISOString());
}

/** @throws Problem `not-found` where it ended meanwhile, or is somebody else's */
export function endSession(ctx: Visitor, handle: string): void {
  const session = listSessions(ctx).find(({ id }) => sessionHandle(id) === handle);
  if (!session) throw new Problem("not-found", "This session has ended already. Reload the page.");
  deleteSession(ctx.db, session.id);
}

export function endOtherSessions(ctx: Visitor, sessionId: string): void {
  writeTx(ctx.db, (tx) => deleteSessionsOf(tx, ctx.account.id, sessionId));
}

const DAY_MS = 24 * 3600_000;

/** Forgets what signing in needs no more: expired sessions, failures that the limits no longer look at, old links. */
export function forgetEnded(platform: Pick<Platform, "db" | "now">): void {
  const now = platform.now().getTime();
  writeTx(platform.db, (tx) => {
    deleteExpiredSessions(tx, new Date(now).toISOString());
    deleteFailuresBefore(tx, new Date(now - LIMIT_WINDOW_MS).toISOString());
    deleteResetsBefore(tx, new Date(now - DAY_MS).toISOString());
  });
}
