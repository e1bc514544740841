import { keyFingerprint, publicKeyOf } from "#shared/record/sign.ts";
import type { Platform } from "../context.ts";
import { type HolderRow, openHolders } from "../db/members.ts";
import type { EventRow } from "../db/events.ts";
import type { Tx } from "../db/open.ts";
import { findSurvey } from "../db/surveys.ts";
import { queueMail } from "../mail/queue-mail.ts";
import { WITNESS, WITNESS_DAY, witnessMail } from "../mail/templates/witness.ts";
import { linkTo } from "./link-to.ts";

export type Telling = Pick<Platform, "now" | "random" | "mail" | "ownAddress" | "signingKey">;

/** What is told: a few words for the subject, and a clause that follows "In the survey …". */
export interface Happening {
  readonly inBrief: string;
  readonly happened: string;
}

/** A day is told to those who were there in time, and to each of them once. */
export interface DayTold {
  readonly only: (auditor: HolderRow) => boolean;
  /** Names the day in its survey. */
  readonly about: string;
}

/** Queues a mail to each auditor of the survey that gives the record's hash as of an event: a witness outside the database. */
export function tellAuditors(
  tx: Tx,
  platform: Telling,
  event: Pick<EventRow, "surveyId" | "sequence" | "sha256">,
  happening: Happening,
  day: DayTold | null,
): void {
  const auditors = openHolders(tx, event.surveyId, "auditor").filter((auditor) => day?.only(auditor) ?? true);
  if (auditors.length === 0) return;
  const written = witnessMail({
    ...happening,
    survey: findSurvey(tx, event.surveyId)?.name ?? event.surveyId,
    sequence: event.sequence,
    sha256: event.sha256,
    keyFingerprint: keyFingerprint(publicKeyOf(platform.signingKey)),
    replay: linkTo(tx, platform, "/replay"),
  });
  for (const { memberId, name, email } of auditors) {
    queueMail(tx, platform, {
      kind: day ? WITNESS_DAY : WITNESS,
      to: { name, address: email },
      surveyId: event.surveyId,
      ...(day ? { about: `${day.about} to ${memberId}` } : {}),
      secret: false,
      written,
    });
  }
}
