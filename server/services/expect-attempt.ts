import { Problem } from "#shared/problem.ts";
import type { Platform } from "../context.ts";
import { writeTx } from "../db/open.ts";
import { failuresSince, insertFailure } from "../db/sign-in-failures.ts";

const MINUTE_MS = 60_000;

/** How far the limits look back. */
export const LIMIT_WINDOW_MS = 15 * MINUTE_MS;

/** Wrong passwords within that time after which an address, or whoever tries from one network address, has to wait. */
export const FAILURES_AN_ADDRESS = 10;
export const FAILURES_A_SOURCE = 50;

export interface Attempt {
  readonly email: string;
  /** Network address of whoever tries. */
  readonly source: string;
}

/**
 * Counts an attempt as failed before the password is looked at, so that many at once can't all slip through; a right password
 * takes it back with the others of the address. What is refused here is not counted: the wait does not grow by trying.
 * @throws Problem `too-many-requests` that says when to try again
 */
export function expectAttempt(platform: Pick<Platform, "db" | "now">, { email, source }: Attempt): void {
  const now = platform.now();
  const since = new Date(now.getTime() - LIMIT_WINDOW_MS).toISOString();
  writeTx(platform.db, (tx) => {
    const waits = [
      waitAfter(failuresSince(tx, { email }, since, FAILURES_AN_ADDRESS), FAILURES_AN_ADDRESS, now),
      waitAfter(failuresSince(tx, { source }, since, FAILURES_A_SOURCE), FAILURES_A_SOURCE, now),
    ];
    const minutes = Math.max(...waits);
    if (minutes > 0) throw tooMany(minutes);
    insertFailure(tx, { email, source, at: now.toISOString() });
  });
}

/** Minutes, rounded up, until the oldest of so many failures no longer counts; 0 where there are fewer. */
function waitAfter(newestFirst: readonly string[], most: number, now: Date): number {
  const oldest = newestFirst[most - 1];
  if (oldest === undefined) return 0;
  return Math.max(1, Math.ceil((Date.parse(oldest) + LIMIT_WINDOW_MS - now.getTime()) / MINUTE_MS));
}

function tooMany(minutes: number): Problem {
  const wait = minutes === 1 ? "a minute" : `${minutes} minutes`;
  return new Problem(
    "too-many-requests",
    `To keep accounts safe, passwords can be tried again in ${wait}. Your account is as it was. If the password is forgotten, a link to set a new one works meanwhile.`,
  );
}
