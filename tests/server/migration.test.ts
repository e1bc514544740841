import { createHash } from "node:crypto";
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import Database from "better-sqlite3";
import { afterAll, beforeAll, expect, test } from "vitest";
import { closeDb, type Db, openDb } from "#server/db/open.ts";
import { startTeam, startTestServer, type TestServer } from "../fixtures/server.ts";
import { runWholeSurvey } from "../fixtures/whole-survey.ts";

// A database as the first migration left it, with the rows of a whole survey in every column that it had.
const DRIZZLE = join(import.meta.dirname, "../../drizzle");

let server: TestServer;
let folder: string;
let before: Map<string, Rows>;
let db: Db;

type Rows = readonly Record<string, unknown>[];

beforeAll(async () => {
  server = await startTestServer();
  await runWholeSurvey(server, await startTeam(server));
  folder = mkdtempSync(join(tmpdir(), "quillet-migration-"));
  const file = join(folder, "old.sqlite");
  startOld(file);
  before = fillOld(server.platform.db.$client, file);
  db = openDb(file);
}, 120_000);

afterAll(async () => {
  closeDb(db);
  await server.stop();
  rmSync(folder, { recursive: true, force: true });
});

function startOld(file: string): void {
  const sqlite = new Database(file);
  const sql = readFileSync(join(DRIZZLE, "0000_start.sql"), "utf8");
  for (const statement of sql.split("--> statement-breakpoint")) sqlite.exec(statement);
  // As drizzle-orm keeps which migrations were made.
  sqlite.exec("CREATE TABLE __drizzle_migrations (id SERIAL PRIMARY KEY, hash text NOT NULL, created_at numeric)");
  const journal = JSON.parse(readFileSync(join(DRIZZLE, "meta/_journal.json"), "utf8")) as {
    entries: { when: number }[];
  };
  sqlite
    .prepare("INSERT INTO __drizzle_migrations (hash, created_at) VALUES (?, ?)")
    .run(createHash("sha256").update(sql).digest("hex"), journal.entries[0]?.when);
  sqlite.close();
}

/** Copies what the old tables can hold, and returns it. */
function fillOld(from: Database.Database, file: string): Map<string, Rows> {
  from.pragma("foreign_keys = OFF");
  from.prepare("ATTACH ? AS old").run(file);
  const filled = new Map<string, Rows>();
  for (const table of tablesOf(from, "old")) {
    const columns = (from.pragma(`old.table_info(${table})`) as { name: string }[]).map(({ name }) => name).join(", ");
    from.exec(`INSERT INTO old.${table} (${columns}) SELECT ${columns} FROM main.${table}`);
    filled.set(table, from.prepare(`SELECT ${columns} FROM old.${table} ORDER BY rowid`).all() as Rows);
  }
  from.exec("DETACH old");
  from.pragma("foreign_keys = ON");
  return filled;
}

function tablesOf(sqlite: Database.Database, schema: string): string[] {
  const sql = `SELECT name FROM ${schema}.sqlite_master WHERE type = 'table' AND name NOT LIKE '\\_\\_%' ESCAPE '\\'
    AND name NOT LIKE 'sqlite\\_%' ESCAPE '\\'`;
  return sqlite.prepare(sql).pluck().all() as string[];
}

test("a database that was filled before accounts could be closed keeps every row as it was", () => {
  expect(before.size).toBe(26);
  expect([...before].filter(([, rows]) => rows.length === 0).map(([table]) => table)).toEqual(["tokens", "zones"]);
  for (const [table, rows] of before) {
    const columns = Object.keys(rows[0] ?? { "1": 1 }).join(", ");
    expect(db.$client.prepare(`SELECT ${columns} FROM ${table} ORDER BY rowid`).all(), table).toEqual(rows);
  }
});

test("it has the new tables, empty, every account open, no broken reference, and its guards", () => {
  const fresh = tablesOf(db.$client, "main").filter((table) => !before.has(table));
  expect(fresh).toContain("invitations");
  for (const table of fresh) expect(db.$client.prepare(`SELECT count(*) FROM ${table}`).pluck().get(), table).toBe(0);
  expect(db.$client.prepare("SELECT count(*) FROM accounts WHERE closed_at IS NOT NULL").pluck().get()).toBe(0);
  expect(db.$client.pragma("foreign_key_check")).toEqual([]);
  expect(() => db.$client.exec("DELETE FROM events")).toThrow("append-only");
});

test("a database of a newer version is refused by name, and stays as it is", () => {
  const file = join(folder, "newer.sqlite");
  const newer = openDb(file);
  newer.$client.prepare("INSERT INTO __drizzle_migrations (hash, created_at) VALUES ('later', 9e12)").run();
  closeDb(newer);
  expect(() => openDb(file)).toThrow(/newer version/);
});
