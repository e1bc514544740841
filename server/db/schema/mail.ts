import { index, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { surveys } from "./surveys.ts";

/** Every mail that the product ever wrote, and how it went. Without SMTP they are kept here to be read and forwarded. */
export const mails = sqliteTable(
  "mails",
  {
    id: text().primaryKey(),
    /** The template: server/mail has a file for each. */
    kind: text().notNull(),
    surveyId: text().references(() => surveys.id),
    /** What it is about, so that it is written once: "day 2031-05-02", for instance. Null where nothing else says the same. */
    about: text().unique(),
    toAddress: text().notNull(),
    toName: text().notNull(),
    subject: text().notNull(),
    text: text().notNull(),
    html: text().notNull(),
    /** Holds a link that lets somebody in: the texts are emptied once it is sent or its link is used up. */
    secret: integer({ mode: "boolean" }).notNull(),
    state: text({ enum: ["waiting", "sent", "kept", "failed"] }).notNull(),
    attempts: integer().notNull(),
    /** When it is tried again; null where it won't be. */
    nextAttemptAt: text(),
    lastError: text().notNull(),
    createdAt: text().notNull(),
    sentAt: text(),
  },
  (t) => [index("mails_next").on(t.state, t.nextAttemptAt), index("mails_survey").on(t.surveyId)],
);
