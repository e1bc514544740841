import { and, eq, isNull } from "drizzle-orm";
import type { Reader } from "./open.ts";
import { accounts, members, memberships } from "./schema/accounts.ts";

export interface AuditorRow {
  readonly memberId: string;
  readonly name: string;
  readonly email: string;
  /** Since when this person is an auditor of the survey. */
  readonly since: string;
}

/** The auditors of a survey: neither those who were removed nor those whose account is closed. */
export function auditorsOf(reader: Reader, surveyId: string): AuditorRow[] {
  return reader
    .select({ memberId: members.id, name: accounts.name, email: accounts.email, since: memberships.addedAt })
    .from(members)
    .innerJoin(accounts, eq(accounts.id, members.accountId))
    .innerJoin(memberships, eq(memberships.memberId, members.id))
    .where(
      and(
        eq(members.surveyId, surveyId),
        eq(memberships.role, "auditor"),
        isNull(memberships.removedAt),
        isNull(accounts.closedAt),
      ),
    )
    .orderBy(memberships.addedAt, members.id)
    .all();
}
