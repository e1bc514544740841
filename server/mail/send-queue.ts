import type { Platform } from "../context.ts";
import {
  changeMail,
  deleteSentBefore,
  findMail,
  keepWaitingMails,
  type MailChange,
  type MailRow,
  nextDueMail,
  secretsAbout,
  unsentSecrets,
} from "../db/mails.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { MailRefused, type MailServer } from "./mail-server.ts";
import { RESET } from "./templates/reset.ts";
import { WITNESS, WITNESS_DAY } from "./templates/witness.ts";

type Sending = Pick<Platform, "db" | "mail" | "now" | "log">;

const MINUTE_MS = 60_000;
const HOUR_MS = 60 * MINUTE_MS;
const DAY_MS = 24 * HOUR_MS;

/** How long a mail waits after each attempt that did not succeed; after one more it has failed. */
export const WAITS_MS = [1, 5, 30, 2 * 60, 6 * 60, 12 * 60, 24 * 60].map((minutes) => minutes * MINUTE_MS);

const MAILS_A_ROUND = 20;
const KEPT_DAYS = 180;

/** How long the links in mails work at most, by kind of mail; a mail that holds an ended link is emptied. */
const RESET_LINK_MS = 2 * HOUR_MS;
const OTHER_LINK_MS = 14 * DAY_MS;

const EMPTIED =
  "This mail held a link that lets somebody in. Its text was taken out when the link was sent, used or ended.";
const ENDED = "The link in it ended before it could be sent.";

/**
 * One round of the queue: empties mails whose links have ended, sends what is due, oldest first, and forgets what was sent
 * long ago. A mail is marked only after the server has taken it, so a crash between the two sends it twice and never loses
 * it. After trouble that is the server's own the round ends: the others are no better off.
 */
export async function sendQueue(platform: Sending): Promise<void> {
  const { db, mail: server } = platform;
  writeTx(db, (tx) => tidy(tx, platform.now()));
  if (server === null) {
    writeTx(db, keepWaitingMails);
    return;
  }
  for (let n = 0; n < MAILS_A_ROUND; n += 1) {
    const mail = nextDueMail(db, platform.now().toISOString());
    if (!mail) return;
    const refused = await tryToSend(server, mail);
    const now = platform.now();
    writeTx(db, (tx) => {
      const endedMeanwhile = refused !== null && mail.secret && isEmptiedNow(tx, mail.id);
      if (!endedMeanwhile) changeMail(tx, mail.id, refused ? notSent(mail, refused, now) : sent(mail, now));
    });
    if (refused) platform.log.warn({ mail: mail.id, kind: mail.kind, said: refused.message }, "a mail was not taken");
    if (refused?.others === false) return;
  }
}

/** Empties the mails about something whose link was used, withdrawn or replaced; one that still waits is not sent any more. */
export function emptyMailsAbout(tx: Tx, about: string): void {
  for (const mail of secretsAbout(tx, about)) changeMail(tx, mail.id, emptied(mail));
}

/** Whether a mail's text was taken out. */
export function isEmptied(mail: Pick<MailRow, "secret" | "html">): boolean {
  return mail.secret && mail.html === "";
}

/** While a server takes its time, the link in the mail may have been used, withdrawn or replaced. */
function isEmptiedNow(tx: Tx, id: string): boolean {
  const found = findMail(tx, id);
  return found !== undefined && isEmptied(found.mail);
}

async function tryToSend(server: MailServer, { id, toName, toAddress, subject, text, html }: MailRow) {
  try {
    await server.send({ id, to: { name: toName, address: toAddress }, subject, text, html });
    return null;
  } catch (error) {
    return error instanceof MailRefused ? error : new MailRefused(String(error), { forEver: false, others: true });
  }
}

function sent(mail: MailRow, now: Date): MailChange {
  return {
    state: "sent",
    attempts: mail.attempts + 1,
    nextAttemptAt: null,
    lastError: "",
    sentAt: now.toISOString(),
    ...(mail.secret ? { text: EMPTIED, html: "" } : {}),
  };
}

function notSent(mail: MailRow, refused: MailRefused, now: Date): MailChange {
  const wait = refused.forEver ? undefined : WAITS_MS[mail.attempts];
  return {
    state: wait === undefined ? "failed" : "waiting",
    attempts: mail.attempts + 1,
    nextAttemptAt: wait === undefined ? null : new Date(now.getTime() + wait).toISOString(),
    lastError: refused.message,
  };
}

function emptied(mail: MailRow): MailChange {
  const text = { text: EMPTIED, html: "" };
  return mail.state === "waiting" ? { ...text, state: "failed", nextAttemptAt: null, lastError: ENDED } : text;
}

function tidy(tx: Tx, now: Date): void {
  for (const mail of unsentSecrets(tx)) {
    const life = mail.kind === RESET ? RESET_LINK_MS : OTHER_LINK_MS;
    if (Date.parse(mail.createdAt) + life <= now.getTime()) changeMail(tx, mail.id, emptied(mail));
  }
  deleteSentBefore(tx, new Date(now.getTime() - KEPT_DAYS * DAY_MS).toISOString(), [WITNESS, WITNESS_DAY]);
}
