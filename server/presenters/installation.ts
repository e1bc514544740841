import type { Session } from "#shared/api/accounts.ts";
import type { Installation, InstallationSettings, MailSummary } from "#shared/api/installation.ts";
import type { Platform } from "../context.ts";
import type { InstallationRow } from "../db/installation.ts";
import type { MailWithSurvey } from "../db/mails.ts";
import { isEmptied } from "../mail/send-queue.ts";
import { DAYS_KEPT } from "../services/daily-backup.ts";
import type { InstallationView } from "../services/read-installation.ts";

export function presentBaseMap({ baseMapUrl, baseMapAttribution }: InstallationRow): Session["baseMap"] {
  return baseMapUrl === null ? null : { url: baseMapUrl, attribution: baseMapAttribution ?? "" };
}

export function presentInstallationSettings(row: InstallationRow): InstallationSettings {
  return { publicAddress: row.publicAddress, baseMap: presentBaseMap(row) };
}

export function presentInstallation(platform: Platform, view: InstallationView): Installation {
  const { waiting, failed, kept } = view.mails;
  return {
    version: platform.version,
    demo: platform.demo,
    keyFingerprint: view.keyFingerprint,
    storage: view.storage,
    backups: {
      automatic: platform.dailyCopies !== null,
      keptDays: DAYS_KEPT,
      copies: [...view.copies],
      lastError: platform.dailyCopies?.lastError ?? null,
    },
    mail: { server: platform.mail?.name ?? null, from: platform.mail?.from ?? null, waiting, failed, kept },
  };
}

export function presentMailSummary({ mail, survey }: MailWithSurvey): MailSummary {
  const { id, kind, subject, state, attempts, nextAttemptAt, lastError, createdAt, sentAt } = mail;
  const to = mail.toName === "" ? mail.toAddress : `${mail.toName} <${mail.toAddress}>`;
  return { id, kind, to, subject, survey, state, attempts, nextAttemptAt, lastError, createdAt, sentAt };
}

export function presentMail(found: MailWithSurvey) {
  return { ...presentMailSummary(found), text: found.mail.text, emptied: isEmptied(found.mail) };
}
