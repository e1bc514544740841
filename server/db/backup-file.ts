import Database from "better-sqlite3";

const FORMAT = "quillet-backup/1";

/** What a backup holds beside the database itself. */
export interface BackupEnvelope {
  readonly madeAt: string;
  /** Without it nobody could add to a chain that was signed with it. */
  readonly signingKey: string;
}

/** Writes the state of one moment into a new file, also while others write, and the envelope into a table of its own. */
export function writeBackupFile(databaseFile: string, file: string, { madeAt, signingKey }: BackupEnvelope): void {
  const source = new Database(databaseFile, { readonly: true, fileMustExist: true, timeout: 10_000 });
  try {
    source.prepare("VACUUM INTO ?").run(file); // a reader in WAL mode sees no later writes
  } finally {
    source.close();
  }
  const copy = new Database(file);
  try {
    copy.exec("CREATE TABLE quillet_backup (format TEXT NOT NULL, made_at TEXT NOT NULL, signing_key TEXT NOT NULL)");
    copy.prepare("INSERT INTO quillet_backup VALUES (?, ?, ?)").run(FORMAT, madeAt, signingKey);
  } finally {
    copy.close();
  }
}

/** Takes the envelope out of a copy of a backup, which is then a plain database again; null for any other file. */
export function takeBackupEnvelope(file: string): BackupEnvelope | null {
  let copy: Database.Database | undefined;
  try {
    copy = new Database(file);
    const row = copy.prepare("SELECT format, made_at, signing_key FROM quillet_backup").get() as
      { format: string; made_at: string; signing_key: string } | undefined;
    if (row?.format !== FORMAT) return null;
    copy.exec("DROP TABLE quillet_backup");
    return { madeAt: row.made_at, signingKey: row.signing_key };
  } catch {
    return null; // no SQLite file, a damaged one, or one without the table
  } finally {
    copy?.close();
  }
}
