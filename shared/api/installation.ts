import * as z from "zod/mini";
import { baseMapOrigins } from "#shared/api/base-map.ts";
import { email, id, none, utc } from "#shared/api/common.ts";
import { contract, json } from "#shared/api/contract.ts";

/** What an owner sets for everybody. */
export const installationSettings = z.object({
  /** Links in mails begin with it; null while nobody has set it. */
  publicAddress: z.nullable(z.url({ protocol: /^https?$/ })),
  baseMap: z.nullable(
    z.object({
      /** XYZ template. */
      url: z.string().check(
        z.trim(),
        z.maxLength(500),
        z.refine((url) => baseMapOrigins(url) !== null, "is no address with {z}, {x} and {y}"),
      ),
      attribution: z.string().check(z.trim(), z.minLength(1, "is empty"), z.maxLength(500)),
    }),
  ),
});
export type InstallationSettings = z.infer<typeof installationSettings>;

export const readInstallationSettings = contract({
  name: "readInstallationSettings",
  method: "GET",
  path: "/api/installation/settings",
  guard: "owner",
  summary: "What an owner sets for everybody, with an ETag",
  params: none,
  query: none,
  body: none,
  versioned: true,
  answer: json(installationSettings),
});

export const changeInstallationSettings = contract({
  name: "changeInstallationSettings",
  method: "PUT",
  path: "/api/installation/settings",
  guard: "owner",
  summary: "Change the settings that were seen (If-Match)",
  params: none,
  query: none,
  body: installationSettings,
  versioned: true,
  answer: json(installationSettings),
});

export const readInstallation = contract({
  name: "readInstallation",
  method: "GET",
  path: "/api/installation",
  guard: "owner",
  summary: "Version, storage, backups and mail of this installation",
  params: none,
  query: none,
  body: none,
  answer: json(
    z.object({
      version: z.string(),
      demo: z.boolean(),
      keyFingerprint: z.string(),
      storage: z.object({ databaseBytes: z.int(), freeBytes: z.int(), surveys: z.int(), accounts: z.int() }),
      backups: z.object({
        /** Daily copies are made in real mode. */
        automatic: z.boolean(),
        keptDays: z.int(),
        copies: z.array(z.object({ name: z.string(), bytes: z.int(), at: utc })),
        lastError: z.nullable(z.string()),
      }),
      mail: z.object({
        /** Null: none is configured, and mails are kept here to be read and forwarded. */
        server: z.nullable(z.string()),
        from: z.nullable(z.string()),
        waiting: z.int(),
        failed: z.int(),
        kept: z.int(),
      }),
    }),
  ),
});
export type Installation = z.infer<(typeof readInstallation)["answer"]["schema"]>;

export const ownedAccount = z.object({
  id,
  name: z.string(),
  email: z.string(),
  isOwner: z.boolean(),
  isSelf: z.boolean(),
  createdAt: utc,
  lastSeenAt: z.nullable(utc),
  closedAt: z.nullable(utc),
  /** In how many surveys this person holds a role. */
  surveys: z.int(),
});
export type OwnedAccount = z.infer<typeof ownedAccount>;

export const openInvitation = z.object({
  id,
  email: z.string(),
  /** Null: to the installation. */
  survey: z.nullable(z.string()),
  makesOwner: z.boolean(),
  expiresAt: utc,
  expired: z.boolean(),
});

const accounts = json(z.object({ accounts: z.array(ownedAccount), invitations: z.array(openInvitation) }));

export const listAccounts = contract({
  name: "listAccounts",
  method: "GET",
  path: "/api/installation/accounts",
  guard: "owner",
  summary: "Every account, and who is invited",
  params: none,
  query: none,
  body: none,
  answer: accounts,
});

export const inviteAccount = contract({
  name: "inviteAccount",
  method: "POST",
  path: "/api/installation/invitations",
  guard: "owner",
  summary: "Invite somebody to the installation, as an owner or without a survey yet",
  params: none,
  query: none,
  body: z.object({ email, makesOwner: z.boolean() }),
  answer: accounts,
});

export const withdrawAccountInvitation = contract({
  name: "withdrawAccountInvitation",
  method: "DELETE",
  path: "/api/installation/invitations/:invitationId",
  guard: "owner",
  summary: "End an invitation to the installation that nobody has accepted",
  params: z.object({ invitationId: id }),
  query: none,
  body: none,
  answer: accounts,
});

export const changeAccount = contract({
  name: "changeAccount",
  method: "PUT",
  path: "/api/installation/accounts/:accountId",
  guard: "owner",
  summary: "Make somebody an owner or not, close their account (every session ends) or open it again",
  params: z.object({ accountId: id }),
  query: none,
  body: z.object({
    isOwner: z.boolean(),
    closed: z.boolean(),
    /** What the sender saw; refused where it is otherwise by now. Left out: whatever it is. */
    seen: z.optional(z.object({ isOwner: z.boolean(), closed: z.boolean() })),
  }),
  answer: accounts,
});

export const sendReset = contract({
  name: "sendReset",
  method: "POST",
  path: "/api/installation/accounts/:accountId/reset",
  guard: "owner",
  summary: "Send somebody a link to set a new password",
  params: z.object({ accountId: id }),
  query: none,
  body: none,
  answer: json(none),
});

export const mailSummary = z.object({
  id,
  kind: z.string(),
  to: z.string(),
  subject: z.string(),
  survey: z.nullable(z.string()),
  state: z.enum(["waiting", "sent", "kept", "failed"]),
  attempts: z.int(),
  nextAttemptAt: z.nullable(utc),
  lastError: z.string(),
  createdAt: utc,
  sentAt: z.nullable(utc),
});
export type MailSummary = z.infer<typeof mailSummary>;
const mail = z.extend(mailSummary, {
  text: z.string(),
  /** Its text was emptied, because it held a link that is sent or used up. */
  emptied: z.boolean(),
});

export const listMails = contract({
  name: "listMails",
  method: "GET",
  path: "/api/installation/mails",
  guard: "owner",
  summary: "Mails and how each went, newest first",
  params: none,
  query: z.object({ before: z.optional(id), state: z.optional(z.enum(["waiting", "sent", "kept", "failed"])) }),
  body: none,
  answer: json(z.object({ mails: z.array(mailSummary), more: z.boolean() })),
});

export const readMail = contract({
  name: "readMail",
  method: "GET",
  path: "/api/installation/mails/:mailId",
  guard: "owner",
  summary: "One mail as it was written, to be read and forwarded",
  params: z.object({ mailId: id }),
  query: none,
  body: none,
  answer: json(mail),
});

export const sendMailAgain = contract({
  name: "sendMailAgain",
  method: "POST",
  path: "/api/installation/mails/:mailId/again",
  guard: "owner",
  summary: "Try again to send a mail that failed or is kept",
  params: z.object({ mailId: id }),
  query: none,
  body: none,
  answer: json(mail),
});
