import { and, asc, count, desc, eq, lt, lte, ne, notInArray, or, type SQL } from "drizzle-orm";
import type { Reader, Tx } from "./open.ts";
import { mails } from "./schema/mail.ts";
import { surveys } from "./schema/surveys.ts";

export type MailRow = typeof mails.$inferSelect;
export type MailState = MailRow["state"];

/** A second mail about the same is not written. */
export function insertMail(tx: Tx, row: MailRow): void {
  tx.insert(mails).values(row).onConflictDoNothing({ target: mails.about }).run();
}

/** The oldest mail that is to be sent by now. */
export function nextDueMail(reader: Reader, now: string): MailRow | undefined {
  return reader
    .select()
    .from(mails)
    .where(and(eq(mails.state, "waiting"), lte(mails.nextAttemptAt, now)))
    .orderBy(asc(mails.createdAt), asc(mails.id))
    .limit(1)
    .get();
}

export type MailChange = Partial<Omit<MailRow, "id">>;

export function changeMail(tx: Tx, id: string, change: MailChange): void {
  tx.update(mails).set(change).where(eq(mails.id, id)).run();
}

/** Without a server that takes them, mails that wait are kept. */
export function keepWaitingMails(tx: Tx): void {
  tx.update(mails).set({ state: "kept", nextAttemptAt: null }).where(eq(mails.state, "waiting")).run();
}

/** Mails that still hold a link that lets somebody in, unless they were sent. */
export function unsentSecrets(reader: Reader): MailRow[] {
  return reader
    .select()
    .from(mails)
    .where(and(eq(mails.secret, true), ne(mails.state, "sent"), ne(mails.html, "")))
    .all();
}

/** Mails about something that still hold their link. */
export function secretsAbout(reader: Reader, about: string): MailRow[] {
  return reader
    .select()
    .from(mails)
    .where(and(eq(mails.about, about), eq(mails.secret, true), ne(mails.html, "")))
    .all();
}

/** Deletes mails that were sent before a time, but none of the kinds that are kept for ever. */
export function deleteSentBefore(tx: Tx, at: string, keptKinds: readonly string[]): void {
  tx.delete(mails)
    .where(and(eq(mails.state, "sent"), lt(mails.sentAt, at), notInArray(mails.kind, [...keptKinds])))
    .run();
}

/** When the newest mail of a kind was written in a survey. */
export function newestMailAt(reader: Reader, surveyId: string, kind: string): string | null {
  const row = reader
    .select({ at: mails.createdAt })
    .from(mails)
    .where(and(eq(mails.surveyId, surveyId), eq(mails.kind, kind)))
    .orderBy(desc(mails.createdAt))
    .limit(1)
    .get();
  return row?.at ?? null;
}

export interface MailWithSurvey {
  readonly mail: MailRow;
  readonly survey: string | null;
}

export function findMail(reader: Reader, id: string): MailWithSurvey | undefined {
  return reader
    .select({ mail: mails, survey: surveys.name })
    .from(mails)
    .leftJoin(surveys, eq(surveys.id, mails.surveyId))
    .where(eq(mails.id, id))
    .get();
}

/** Newest first, at most `limit`; those before a mail, and in a state, where these are given. */
export function mailsBefore(
  reader: Reader,
  { before, state }: { readonly before: MailRow | undefined; readonly state: MailState | undefined },
  limit: number,
): MailWithSurvey[] {
  return reader
    .select({ mail: mails, survey: surveys.name })
    .from(mails)
    .leftJoin(surveys, eq(surveys.id, mails.surveyId))
    .where(and(state === undefined ? undefined : eq(mails.state, state), before && olderThan(before)))
    .orderBy(desc(mails.createdAt), desc(mails.id))
    .limit(limit)
    .all();
}

/** Mails of one moment are in the order of their ids. */
function olderThan({ createdAt, id }: MailRow): SQL | undefined {
  return or(lt(mails.createdAt, createdAt), and(eq(mails.createdAt, createdAt), lt(mails.id, id)));
}

export function mailsByState(reader: Reader): Readonly<Record<MailState, number>> {
  const rows = reader.select({ state: mails.state, mails: count() }).from(mails).groupBy(mails.state).all();
  return { waiting: 0, sent: 0, kept: 0, failed: 0, ...Object.fromEntries(rows.map((row) => [row.state, row.mails])) };
}
