import { readSession } from "#shared/api/accounts.ts";
import {
  type Installation,
  listAccounts,
  listMails,
  type MailSummary,
  type OwnedAccount,
  readInstallation,
  readInstallationSettings,
} from "#shared/api/installation.ts";
import { listSurveys } from "#shared/api/surveys.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session } from "../app/fixtures.ts";

export const ines: OwnedAccount = {
  id: "a1",
  name: "Ines Marrow",
  email: "ines@example.org",
  isOwner: true,
  isSelf: true,
  createdAt: "2031-05-01T08:00:00Z",
  lastSeenAt: "2031-05-02T08:00:00Z",
  closedAt: null,
  surveys: 2,
};

export const tom: OwnedAccount = {
  ...ines,
  id: "a2",
  name: "Tom Ashby",
  email: "tom@example.org",
  isOwner: false,
  isSelf: false,
  lastSeenAt: null,
};

export function installation(part: Partial<Installation> = {}): Installation {
  return {
    version: "0.3.0",
    demo: false,
    keyFingerprint: "ab".repeat(32),
    storage: { databaseBytes: 41_000_000, freeBytes: 9_000_000_000, surveys: 5, accounts: 7 },
    backups: {
      automatic: true,
      keptDays: 14,
      copies: [{ name: "quillet-2031-05-02.backup", bytes: 40_100_000, at: "2031-05-02T02:00:00Z" }],
      lastError: null,
    },
    mail: {
      server: "mail.example.org:587",
      from: "Quillet <surveys@example.org>",
      waiting: 0,
      failed: 1,
      kept: 0,
    },
    ...part,
  };
}

export const failed: MailSummary = {
  id: "ml1",
  kind: "invitation",
  to: "Tom Ashby <tom@example.org>",
  subject: "An invitation to Pellimere Fen",
  survey: "Pellimere Fen",
  state: "failed",
  attempts: 5,
  nextAttemptAt: null,
  lastError: "550 no such mailbox",
  createdAt: "2031-05-02T08:00:00Z",
  sentAt: null,
};

/** Signed in as an owner, with one other account and one failed mail. */
export function ownersApi(): FakeApi {
  const account = { id: "a1", name: "Ines Marrow", email: "ines@example.org", isOwner: true };
  return new FakeApi()
    .on(readSession, () => session({ account }))
    .on(listSurveys, () => ({ surveys: [], installation: null }))
    .on(readInstallation, () => installation())
    .on(listAccounts, () => ({ accounts: [ines, tom], invitations: [] }))
    .on(listMails, () => ({ mails: [failed], more: false }))
    .on(readInstallationSettings, () => ({ publicAddress: null, baseMap: null }));
}
