import { existsSync, renameSync, rmSync, statSync, writeFileSync } from "node:fs";
import { Problem } from "#shared/problem.ts";
import { type BackupEnvelope, writeBackupFile } from "../db/backup-file.ts";

export interface BackupTask extends BackupEnvelope {
  readonly databaseFile: string;
  readonly file: string;
}

/**
 * Copies a database, also while it is served, into one file that `quillet restore` reads: the state of one moment, since a
 * reader in WAL mode sees no later writes. The file holds the signing key, so nobody else may read it. Blocks until it is done.
 * Returns its size in bytes.
 * @throws Problem `backup-exists` where there is a file of that name
 */
export function backUp({ databaseFile, file, signingKey, madeAt }: BackupTask): number {
  if (existsSync(file)) throw new Problem("backup-exists", `${file} is there. Give another name, or move it away.`);
  const part = `${file}.part`;
  rmSync(part, { force: true });
  try {
    writeFileSync(part, "", { mode: 0o600 });
    writeBackupFile(databaseFile, part, { madeAt, signingKey });
    renameSync(part, file);
  } catch (error) {
    rmSync(part, { force: true }); // a full disk must not stay full of halves
    throw error;
  }
  return statSync(file).size;
}
