import type { Logger } from "pino";
import type { Role } from "#shared/access/table.ts";
import type { Db } from "./db/open.ts";
import type { Jobs } from "./jobs/jobs.ts";
import type { MailServer } from "./mail/mail-server.ts";

/** The daily copies of an installation. */
export interface DailyCopies {
  readonly folder: string;
  /** Why the last attempt failed; null after one that did not. */
  lastError: string | null;
}

/** What every service may reach that is not the request: tests build one by hand; nothing reads a global. */
export interface Platform {
  readonly db: Db;
  readonly now: () => Date;
  /** Bytes of the operating system's random source. */
  readonly random: (bytes: number) => Uint8Array;
  /** Ed25519 key of the installation, hexadecimal. */
  readonly signingKey: string;
  readonly jobs: Jobs;
  /** Null where no SMTP server is configured: mails are then kept to be read and forwarded. */
  readonly mail: MailServer | null;
  /** The address that this process answers at, for links where the owner has set none. */
  readonly ownAddress: () => string;
  /** Null where no daily copies are made, as in the demo. */
  readonly dailyCopies: DailyCopies | null;
  readonly log: Logger;
  readonly demo: boolean;
  readonly version: string;
}

/** Somebody signed in. */
export interface Visitor extends Platform {
  readonly account: { readonly id: string; readonly name: string; readonly email: string; readonly isOwner: boolean };
}

/** Somebody acting inside a survey, after mount has checked the action of the contract. */
export interface Context extends Visitor {
  readonly surveyId: string;
  /** The opaque id that the record names; null for an owner who holds no role here. */
  readonly memberId: string | null;
  readonly roles: readonly Role[];
  /** How far the action of this contract reaches: all cells, or only those assigned to this member. */
  readonly reach: "all" | "own";
}
