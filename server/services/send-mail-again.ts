import { Problem } from "#shared/problem.ts";
import type { Visitor } from "../context.ts";
import { changeMail, type MailWithSurvey } from "../db/mails.ts";
import { writeTx } from "../db/open.ts";
import { isEmptied } from "../mail/send-queue.ts";
import { mailHere } from "./list-mails.ts";

/**
 * Puts a mail that failed or is kept back into the queue, with all its attempts before it; one that waits is tried at once.
 * @throws Problem `mail-not-sendable`
 */
export function sendMailAgain({ db, mail: server, now }: Visitor, mailId: string): MailWithSurvey {
  return writeTx(db, (tx) => {
    const { mail } = mailHere(tx, mailId);
    if (mail.state === "sent") {
      throw new Problem("mail-not-sendable", `The server took it at ${mail.sentAt ?? mail.createdAt}.`);
    }
    if (isEmptied(mail)) {
      throw new Problem("mail-not-sendable", "The link in it has ended. Send a new invitation or a new link instead.");
    }
    if (server === null) {
      throw new Problem("mail-not-sendable", "No mail server is set up. Copy its text and forward it yourself.");
    }
    changeMail(tx, mailId, { state: "waiting", attempts: 0, nextAttemptAt: now().toISOString() });
    return mailHere(tx, mailId);
  });
}
