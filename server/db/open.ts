import { readFileSync } from "node:fs";
import { join } from "node:path";
import Database from "better-sqlite3";
import { drizzle } from "drizzle-orm/better-sqlite3";
import { migrate } from "drizzle-orm/better-sqlite3/migrator";
import { Problem } from "#shared/problem.ts";
import { projectRoot } from "../project.ts";
import * as accounts from "./schema/accounts.ts";
import * as area from "./schema/area.ts";
import * as counts from "./schema/counts.ts";
import * as draw from "./schema/draw.ts";
import * as field from "./schema/field.ts";
import * as frame from "./schema/frame.ts";
import * as installation from "./schema/installation.ts";
import * as mail from "./schema/mail.ts";
import * as record from "./schema/record.ts";
import * as surveys from "./schema/surveys.ts";

const schema = {
  ...accounts,
  ...surveys,
  ...area,
  ...frame,
  ...draw,
  ...field,
  ...counts,
  ...record,
  ...mail,
  ...installation,
};

export type Db = ReturnType<typeof openDb>;
export type Tx = Parameters<Parameters<Db["transaction"]>[0]>[0];
/** Named queries take either: reads may run outside a transaction. */
export type Reader = Db | Tx;

/** Opens (and creates) the one database file, brings its shape up to date, and sets the guards. */
export function openDb(file: string) {
  const sqlite = new Database(file);
  sqlite.pragma("busy_timeout = 5000"); // first: switching to WAL can itself wait
  sqlite.pragma("journal_mode = WAL");
  sqlite.pragma("synchronous = FULL"); // a reopened WAL file falls back to NORMAL
  sqlite.pragma("secure_delete = ON"); // what is deleted, a survey or a session, is overwritten
  sqlite.pragma("recursive_triggers = ON"); // so that REPLACE meets the DELETE triggers
  const db = drizzle({ client: sqlite, schema, casing: "snake_case" });

  sqlite.pragma("foreign_keys = OFF"); // a table rebuild would delete the rows that point at it
  if (migrationsPending(sqlite)) {
    dropTriggers(sqlite);
    migrate(db, { migrationsFolder: MIGRATIONS });
  }
  const broken = sqlite.pragma("foreign_key_check") as unknown[];
  if (broken.length > 0) throw new Error(`${broken.length} foreign keys are broken after the migration of ${file}`);
  sqlite.pragma("foreign_keys = ON");
  setTriggers(sqlite);
  return db;
}

/** Takes the write lock at the start, so that a read followed by a write cannot fail half way. */
export function writeTx<T>(db: Db, work: (tx: Tx) => T): T {
  return db.transaction(work, { behavior: "immediate" });
}

/**
 * Does work on rows that the triggers guard. Only inside a write transaction: what fails rolls everything back, the triggers
 * too, and no other connection ever sees the database without them.
 */
export function withoutTriggers(db: Db, work: () => void): void {
  if (!db.$client.inTransaction) throw new Error("the triggers are dropped in a transaction only");
  dropTriggers(db.$client);
  work();
  setTriggers(db.$client);
}

export function closeDb(db: Db): void {
  db.$client.close();
}

const MIGRATIONS = join(projectRoot(), "drizzle");

function migrationsPending(sqlite: Database.Database): boolean {
  const journal = JSON.parse(readFileSync(join(MIGRATIONS, "meta/_journal.json"), "utf8")) as { entries: unknown[] };
  const known = sqlite.prepare("SELECT 1 FROM sqlite_master WHERE name = '__drizzle_migrations'").get();
  const made = known === undefined ? 0 : sqlite.prepare("SELECT count(*) FROM __drizzle_migrations").pluck().get();
  if (Number(made) > journal.entries.length) {
    throw new Problem("database-newer", "It was made by a newer version. Install that version, or one after it.");
  }
  return made !== journal.entries.length;
}

/** Guards that a database file lacks, so that somebody may have changed what is sealed; before `openDb` sets them again. */
export function missingTriggers(file: string): string[] {
  const sqlite = new Database(file, { readonly: true, fileMustExist: true });
  try {
    if (migrationsPending(sqlite)) return []; // an older shape has its own
    const there = new Set(triggerNames(sqlite));
    const wanted = [...triggersText().matchAll(/^CREATE TRIGGER (\w+)/gm)].map(([, name]) => name ?? "");
    return wanted.filter((name) => !there.has(name));
  } finally {
    sqlite.close();
  }
}

const triggersText = (): string => readFileSync(join(projectRoot(), "server/db/triggers.sql"), "utf8");

function triggerNames(sqlite: Database.Database): string[] {
  return sqlite.prepare("SELECT name FROM sqlite_master WHERE type = 'trigger'").pluck().all() as string[];
}

/** All at once, so that no other process that has the file open ever writes without them. */
function setTriggers(sqlite: Database.Database): void {
  const triggers = triggersText();
  sqlite
    .transaction(() => {
      dropTriggers(sqlite);
      sqlite.exec(triggers);
    })
    .immediate();
}

function dropTriggers(sqlite: Database.Database): void {
  for (const name of triggerNames(sqlite)) sqlite.exec(`DROP TRIGGER "${name}"`);
}
