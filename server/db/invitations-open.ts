import { and, eq, isNull } from "drizzle-orm";
import type { Reader } from "./open.ts";
import { invitations } from "./schema/accounts.ts";

/** How many invitations to a survey nobody has accepted: those that still can be, and those that have expired. */
export function invitationsOpen(reader: Reader, surveyId: string, now: string): { open: number; expired: number } {
  const rows = reader
    .select({ expiresAt: invitations.expiresAt })
    .from(invitations)
    .where(and(eq(invitations.surveyId, surveyId), isNull(invitations.acceptedAt), isNull(invitations.withdrawnAt)))
    .all();
  const expired = rows.filter((row) => row.expiresAt <= now).length;
  return { open: rows.length - expired, expired };
}
