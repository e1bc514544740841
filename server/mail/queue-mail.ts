import type { Platform } from "../context.ts";
import { insertMail } from "../db/mails.ts";
import type { Tx } from "../db/open.ts";
import type { Written } from "./template.ts";

export interface NewMail {
  /** The name of its template. */
  readonly kind: string;
  readonly to: { readonly name: string; readonly address: string };
  readonly surveyId: string | null;
  /** What it is about, where it must be written only once; a second one with the same is not queued. */
  readonly about?: string;
  /** Holds a link that lets somebody in. */
  readonly secret: boolean;
  readonly written: Written;
}

/** Puts a mail into the queue in the transaction of what it tells, so that neither is there without the other. Returns its id. */
export function queueMail(tx: Tx, platform: Pick<Platform, "now" | "random" | "mail">, mail: NewMail): string {
  const id = Buffer.from(platform.random(16)).toString("base64url");
  const at = platform.now().toISOString();
  const waits = platform.mail !== null;
  insertMail(tx, {
    id,
    kind: mail.kind,
    surveyId: mail.surveyId,
    about: mail.about ?? null,
    toAddress: mail.to.address,
    toName: mail.to.name,
    ...mail.written,
    secret: mail.secret,
    state: waits ? "waiting" : "kept",
    attempts: 0,
    nextAttemptAt: waits ? at : null,
    lastError: "",
    createdAt: at,
    sentAt: null,
  });
  return id;
}
