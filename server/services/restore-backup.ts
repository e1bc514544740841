import { chmodSync, copyFileSync, existsSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { Problem } from "#shared/problem.ts";
import { takeBackupEnvelope } from "../db/backup-file.ts";
import { lockForServing } from "../db/lock.ts";
import { closeDb, openDb, writeTx } from "../db/open.ts";
import { deleteResetsBefore } from "../db/password-resets.ts";
import { deleteEverySession } from "../db/sessions.ts";
import { checkInstallation, type InstallationCheck } from "./check-installation.ts";

interface Target {
  readonly databaseFile: string;
  readonly signingKeyFile: string;
  /** The key that the environment gives, which a server takes before any file; undefined for none. */
  readonly signingKeyGiven: string | undefined;
  readonly version: string;
  readonly now: () => Date;
}

export interface Restored {
  readonly madeAt: string;
  readonly check: InstallationCheck;
  /** Where the database that was there stands now; null where there was none. */
  readonly setAside: string | null;
}

/**
 * Puts a backup in the place of the database: copied, brought up to date and checked first; only one that is whole replaces
 * anything, and what was there is set aside under a name with the time. The backup's signing key comes with it. Sessions and
 * links to set a password do not: those that were ended since the backup must stay ended.
 * @throws Problem `backup-unusable` where it is none, not whole, or signed with another key than the given one, `already-served` while a server runs on the place
 */
export function restoreBackup(file: string, target: Target): Restored {
  if (!existsSync(file)) throw new Problem("backup-unusable", `There is no file ${file}. Check the name.`);
  const unlock = lockForServing(target.databaseFile);
  const part = `${target.databaseFile}.restore`;
  removeDatabase(part);
  try {
    copyFileSync(file, part);
    chmodSync(part, 0o600);
    const envelope = takeBackupEnvelope(part);
    if (envelope === null) {
      throw new Problem("backup-unusable", `${file} is no backup that this Quillet made. Nothing was replaced.`);
    }
    const { madeAt, signingKey } = envelope;
    if (target.signingKeyGiven !== undefined && target.signingKeyGiven !== signingKey) {
      throw new Problem(
        "backup-unusable",
        "QUILLET_SIGNING_KEY is not the key that its records are signed with: take it out of the environment, then restore again. Nothing was replaced.",
      );
    }
    const check = checkCopy(part, signingKey, target);
    const setAside = setOldAside(target);
    writeFileSync(target.signingKeyFile, signingKey, { mode: 0o600 }); // first: a database never stands beside another's key
    renameSync(part, target.databaseFile);
    return { madeAt, check, setAside };
  } finally {
    removeDatabase(part);
    unlock();
  }
}

/** @throws Problem `backup-unusable` */
function checkCopy(part: string, signingKey: string, { now, version }: Target): InstallationCheck {
  try {
    const db = openDb(part);
    try {
      const check = checkInstallation({ db, now, signingKey, version });
      if (!check.ok) throw notWhole(firstFault(check));
      writeTx(db, (tx) => {
        deleteEverySession(tx);
        deleteResetsBefore(tx, now().toISOString());
      });
      db.$client.pragma("wal_checkpoint(TRUNCATE)");
      return check;
    } finally {
      closeDb(db);
    }
  } catch (error) {
    if (error instanceof Problem) throw error;
    throw notWhole(error instanceof Error ? error.message : String(error)); // damage that stops the walk itself
  }
}

function notWhole(fault: string): Problem {
  return new Problem("backup-unusable", `It is not whole: ${fault}. Nothing was replaced.`);
}

function firstFault({ database, surveys }: InstallationCheck): string {
  const [damage] = database.damage;
  if (damage !== undefined) return damage;
  if (database.brokenForeignKeys > 0) return `${database.brokenForeignKeys} foreign keys are broken`;
  return surveys.flatMap(({ failures }) => failures)[0] ?? "it lacks the guards of what is sealed";
}

function setOldAside({ databaseFile, signingKeyFile, now }: Target): string | null {
  if (!existsSync(databaseFile)) return null;
  const stamp = now().toISOString().replace(/[:.]/g, "-");
  const aside = `${databaseFile}.before-${stamp}`;
  for (const suffix of ["", "-wal", "-shm"]) {
    if (existsSync(`${databaseFile}${suffix}`)) renameSync(`${databaseFile}${suffix}`, `${aside}${suffix}`);
  }
  if (existsSync(signingKeyFile)) copyFileSync(signingKeyFile, `${aside}.signing-key`);
  return aside;
}

function removeDatabase(file: string): void {
  for (const suffix of ["", "-wal", "-shm"]) rmSync(`${file}${suffix}`, { force: true });
}
