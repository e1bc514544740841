import { statSync } from "node:fs";
import { statfs } from "node:fs/promises";
import { dirname } from "node:path";
import { keyFingerprint, publicKeyOf } from "#shared/record/sign.ts";
import type { Platform } from "../context.ts";
import { howMany } from "../db/installation.ts";
import { type MailState, mailsByState } from "../db/mails.ts";
import { copiesIn, type Copy } from "./daily-backup.ts";

export interface InstallationView {
  readonly keyFingerprint: string;
  readonly storage: {
    readonly databaseBytes: number;
    readonly freeBytes: number;
    readonly surveys: number;
    readonly accounts: number;
  };
  readonly copies: readonly Copy[];
  readonly mails: Readonly<Record<MailState, number>>;
}

/** How the installation stands: what is stored where, and how much room is left beside it. */
export async function readInstallation(platform: Platform): Promise<InstallationView> {
  const databaseFile = platform.db.$client.name;
  const { bavail, bsize } = await statfs(dirname(databaseFile));
  const files = [databaseFile, `${databaseFile}-wal`, `${databaseFile}-shm`];
  return {
    keyFingerprint: keyFingerprint(publicKeyOf(platform.signingKey)),
    storage: {
      databaseBytes: files.reduce((sum, file) => sum + (statSync(file, { throwIfNoEntry: false })?.size ?? 0), 0),
      freeBytes: bavail * bsize,
      ...howMany(platform.db),
    },
    copies: platform.dailyCopies ? copiesIn(platform.dailyCopies.folder) : [],
    mails: mailsByState(platform.db),
  };
}
