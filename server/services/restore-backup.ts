import { chmodSync, copyFileSync, existsSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { Problem } from "#shared/problem.ts";
import { takeBackupEnvelope } from "../db/backup-file.ts";
import { lockForServing } from "../db/lock.ts";
import { closeDb, openDb } from "../db/open.ts";
import { checkInstallation, type InstallationCheck } from "./check-installation.ts";

interface Target {
  readonly databaseFile: string;
  readonly signingKeyFile: string;
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
 * anything, and what was there is set aside under a name with the time. The backup's signing key comes with it.
 * @throws Problem `backup-unusable` where it is none or not whole, `already-served` while a server runs on the place
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
    const check = checkCopy(part, signingKey, target);
    if (!check.ok) {
      throw new Problem("backup-unusable", `It is not whole: ${firstFault(check)}. Nothing was replaced.`);
    }
    const setAside = setOldAside(target);
    renameSync(part, target.databaseFile);
    writeFileSync(target.signingKeyFile, signingKey, { mode: 0o600 });
    return { madeAt, check, setAside };
  } finally {
    removeDatabase(part);
    unlock();
  }
}

function checkCopy(part: string, signingKey: string, { now, version }: Target): InstallationCheck {
  const db = openDb(part);
  try {
    const check = checkInstallation({ db, now, signingKey, version });
    db.$client.pragma("wal_checkpoint(TRUNCATE)");
    return check;
  } finally {
    closeDb(db);
  }
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
