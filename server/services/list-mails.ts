import { Problem } from "#shared/problem.ts";
import type { Visitor } from "../context.ts";
import { findMail, mailsBefore, type MailState, type MailWithSurvey } from "../db/mails.ts";
import type { Reader } from "../db/open.ts";

const MAILS_A_PAGE = 50;

/** Mails newest first, a page at a time. */
export function listMails(
  { db }: Visitor,
  { before, state }: { readonly before?: string | undefined; readonly state?: MailState | undefined },
): { readonly mails: readonly MailWithSurvey[]; readonly more: boolean } {
  const from = before === undefined ? undefined : mailHere(db, before).mail;
  const found = mailsBefore(db, { before: from, state }, MAILS_A_PAGE + 1);
  return { mails: found.slice(0, MAILS_A_PAGE), more: found.length > MAILS_A_PAGE };
}

export function readMail({ db }: Visitor, mailId: string): MailWithSurvey {
  return mailHere(db, mailId);
}

/** @throws Problem `not-found` */
export function mailHere(reader: Reader, mailId: string): MailWithSurvey {
  const found = findMail(reader, mailId);
  if (!found) throw new Problem("not-found", "This mail is not here any more. Reload the list of mails.");
  return found;
}
