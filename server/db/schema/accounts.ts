import { sql } from "drizzle-orm";
import { check, index, integer, primaryKey, sqliteTable, text, unique } from "drizzle-orm/sqlite-core";
import { surveys } from "./surveys.ts";

export const accounts = sqliteTable(
  "accounts",
  {
    id: text().primaryKey(),
    /** Stored in lower case, so that a plain unique index is enough. */
    email: text().notNull().unique(),
    name: text().notNull(),
    passwordHash: text().notNull(),
    isOwner: integer({ mode: "boolean" }).notNull(),
    createdAt: text().notNull(),
    /** Since when this person can't sign in any more; the record still names them. */
    closedAt: text(),
  },
  (t) => [check("accounts_email_lower", sql`${t.email} = lower(${t.email})`)],
);

/** The cookie holds only the id; ending a session is deleting its row. */
export const sessions = sqliteTable("sessions", {
  id: text().primaryKey(),
  accountId: text()
    .notNull()
    .references(() => accounts.id, { onDelete: "cascade" }),
  createdAt: text().notNull(),
  lastSeenAt: text().notNull(),
  expiresAt: text().notNull(),
  userAgent: text().notNull(),
});

/** Refused sign-ins, kept for as long as the limits look back. The address need not have an account. */
export const signInFailures = sqliteTable(
  "sign_in_failures",
  {
    id: integer().primaryKey({ autoIncrement: true }),
    email: text().notNull(),
    /** Network address of whoever tried. */
    source: text().notNull(),
    at: text().notNull(),
  },
  (t) => [index("sign_in_failures_email").on(t.email, t.at), index("sign_in_failures_source").on(t.source, t.at)],
);

/** Of the link only the hash is kept. Works once, until it expires or is withdrawn. */
export const invitations = sqliteTable(
  "invitations",
  {
    id: text().primaryKey(),
    /** Null: to the installation, without a survey. */
    surveyId: text().references(() => surveys.id),
    role: text({ enum: ["planner", "lead", "counter", "auditor"] }),
    /** The new account is an owner of the installation. */
    makesOwner: integer({ mode: "boolean" }).notNull(),
    email: text().notNull(),
    secretSha256: text().notNull().unique(),
    invitedBy: text()
      .notNull()
      .references(() => accounts.id),
    createdAt: text().notNull(),
    expiresAt: text().notNull(),
    acceptedAt: text(),
    withdrawnAt: text(),
  },
  (t) => [
    index("invitations_survey").on(t.surveyId),
    check("invitations_role", sql`(${t.surveyId} is null) = (${t.role} is null)`),
  ],
);

/** Of the link only the hash is kept. Works once; a new one ends those before. */
export const passwordResets = sqliteTable("password_resets", {
  id: text().primaryKey(),
  accountId: text()
    .notNull()
    .references(() => accounts.id, { onDelete: "cascade" }),
  secretSha256: text().notNull().unique(),
  createdAt: text().notNull(),
  expiresAt: text().notNull(),
  usedAt: text(),
});

/** Personal access tokens: only the hash of the secret is kept. */
export const tokens = sqliteTable("tokens", {
  id: text().primaryKey(),
  accountId: text()
    .notNull()
    .references(() => accounts.id, { onDelete: "cascade" }),
  name: text().notNull(),
  secretSha256: text().notNull().unique(),
  /** JSON: surveys and whether it may write. */
  scope: text({ mode: "json" }).notNull(),
  createdAt: text().notNull(),
  expiresAt: text(),
  revokedAt: text(),
  lastUsedAt: text(),
});

/** A person inside one survey: the opaque id that the record names. */
export const members = sqliteTable(
  "members",
  {
    id: text().primaryKey(),
    surveyId: text()
      .notNull()
      .references(() => surveys.id),
    accountId: text()
      .notNull()
      .references(() => accounts.id),
    addedAt: text().notNull(),
  },
  (t) => [unique("members_person").on(t.surveyId, t.accountId)],
);

/** The roles of a member; one person may hold two. */
export const memberships = sqliteTable(
  "memberships",
  {
    memberId: text()
      .notNull()
      .references(() => members.id),
    role: text({ enum: ["planner", "lead", "counter", "auditor"] }).notNull(),
    addedAt: text().notNull(),
    removedAt: text(),
  },
  (t) => [
    primaryKey({ columns: [t.memberId, t.role] }),
    check("memberships_role", sql`${t.role} in ('planner', 'lead', 'counter', 'auditor')`),
  ],
);
