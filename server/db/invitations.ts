import { and, asc, count, eq, gt, isNull } from "drizzle-orm";
import type { Role } from "#shared/access/table.ts";
import type { MailRow } from "./mails.ts";
import type { Reader, Tx } from "./open.ts";
import { accounts, invitations } from "./schema/accounts.ts";
import { mails } from "./schema/mail.ts";
import { surveys } from "./schema/surveys.ts";

export type InvitationRow = typeof invitations.$inferSelect;

/** Names what a mail with a link is about, so that it is found by its link. */
export function aboutLink(secretSha256: string): string {
  return `link ${secretSha256}`;
}

const open = and(isNull(invitations.acceptedAt), isNull(invitations.withdrawnAt));

export function insertInvitation(tx: Tx, row: InvitationRow): void {
  tx.insert(invitations).values(row).run();
}

export function updateInvitation(tx: Tx, id: string, change: Partial<Omit<InvitationRow, "id">>): void {
  tx.update(invitations).set(change).where(eq(invitations.id, id)).run();
}

/** How many invitations of an account were written after a moment. */
export function invitationsBy(reader: Reader, accountId: string, after: string): number {
  const row = reader
    .select({ n: count() })
    .from(invitations)
    .where(and(eq(invitations.invitedBy, accountId), gt(invitations.createdAt, after)))
    .get();
  return row?.n ?? 0;
}

/** One that was neither accepted nor withdrawn; it may have expired. */
export function findOpenInvitation(reader: Reader, id: string): InvitationRow | undefined {
  return reader
    .select()
    .from(invitations)
    .where(and(eq(invitations.id, id), open))
    .get();
}

/** By the hash of the link's secret; open, used and ended ones alike. */
export function findInvitationByLink(reader: Reader, secretSha256: string): InvitationRow | undefined {
  return reader.select().from(invitations).where(eq(invitations.secretSha256, secretSha256)).get();
}

/** The open one of an address for a role of a survey, or to the installation. */
export function openInvitationFor(
  reader: Reader,
  email: string,
  to: { readonly surveyId: string; readonly role: Role } | null,
): InvitationRow | undefined {
  const place = to
    ? and(eq(invitations.surveyId, to.surveyId), eq(invitations.role, to.role))
    : isNull(invitations.surveyId);
  return reader
    .select()
    .from(invitations)
    .where(and(eq(invitations.email, email), place, open))
    .get();
}

export interface InvitationSent {
  readonly invitation: InvitationRow;
  readonly invitedBy: string;
  readonly survey: string | null;
  /** How its newest mail stands. */
  readonly mail: MailRow["state"] | null;
}

/** The open ones to a survey, or all where none is given, oldest first. */
export function openInvitations(reader: Reader, surveyId: string | null): InvitationSent[] {
  const rows = reader
    .select({ invitation: invitations, invitedBy: accounts.name, survey: surveys.name })
    .from(invitations)
    .innerJoin(accounts, eq(accounts.id, invitations.invitedBy))
    .leftJoin(surveys, eq(surveys.id, invitations.surveyId))
    .where(surveyId === null ? open : and(eq(invitations.surveyId, surveyId), open))
    .orderBy(asc(invitations.createdAt), asc(invitations.id))
    .all();
  return rows.map((row) => ({ ...row, mail: stateOf(reader, row.invitation) }));
}

function stateOf(reader: Reader, { secretSha256 }: InvitationRow): MailRow["state"] | null {
  const about = aboutLink(secretSha256);
  return reader.select({ state: mails.state }).from(mails).where(eq(mails.about, about)).get()?.state ?? null;
}
