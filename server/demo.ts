import { randomBytes } from "node:crypto";
import { chmodSync, existsSync, readFileSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { pino } from "pino";
import { z } from "zod";
import { anyAccount } from "./db/accounts.ts";
import { closeDb, openDb } from "./db/open.ts";
import type { Env } from "./env.ts";
import type { Jobs } from "./jobs/jobs.ts";
import { DEMO_PEOPLE, type DemoAccount, newDemoAccounts } from "./services/demo/people.ts";

const accountsFile = z.array(
  z.object({
    role: z.enum(DEMO_PEOPLE.map(({ role }) => role)),
    name: z.string(),
    email: z.string(),
    password: z.string(),
  }),
);

/** What filling the demo takes from the installation. */
interface Installation {
  readonly jobs: Jobs;
  readonly signingKey: string;
  readonly version: string;
}

/**
 * In demo mode, the accounts of a demo that is filled: made now where there is none, else as they were. Never seeds in real
 * mode: null there. To be called before the database is opened, because an unfinished or empty demo is made anew.
 *
 * The demo is played into a file of its own, which takes its place in one step: a start that is broken off leaves nothing.
 */
export async function ensureDemo(env: Env, installation: Installation): Promise<readonly DemoAccount[] | null> {
  if (!env.demo) return null;
  const file = join(env.dataFolder, "demo-accounts.json");
  if (existsSync(file) && holdsAccounts(env.databaseFile)) {
    return accountsFile.parse(JSON.parse(readFileSync(file, "utf8")));
  }
  return makeDemo(env, installation, file);
}

/** Forgets the demo, so that the next start (or `ensureDemo`) makes it anew. */
export function forgetDemo(env: Env): void {
  if (!env.demo) throw new RangeError("only the demo can be forgotten");
  removeDatabase(env.databaseFile);
}

async function makeDemo(env: Env, installation: Installation, file: string): Promise<readonly DemoAccount[]> {
  // The story of the demo is loaded when it is played: other starts do without.
  const { fillDemo } = await import("./services/demo/fill-demo.ts");
  const part = `${env.databaseFile}.part`;
  removeDatabase(part);
  const accounts = newDemoAccounts();
  const db = openDb(part);
  try {
    await fillDemo(
      {
        ...installation,
        db,
        now: () => new Date(),
        random: (bytes) => randomBytes(bytes),
        log: pino({ level: "silent" }),
        demo: true,
        mail: null,
        dailyCopies: null,
        ownAddress: () => `http://${env.host}:${env.port}`,
      },
      accounts,
    );
  } finally {
    closeDb(db);
  }
  writeFileSync(file, `${JSON.stringify(accounts, null, 2)}\n`, { mode: 0o600 });
  chmodSync(file, 0o600); // a file that was there keeps its mode otherwise
  removeDatabase(env.databaseFile);
  renameSync(part, env.databaseFile);
  return accounts;
}

function holdsAccounts(databaseFile: string): boolean {
  if (!existsSync(databaseFile)) return false;
  const db = openDb(databaseFile);
  try {
    return anyAccount(db);
  } finally {
    closeDb(db);
  }
}

function removeDatabase(file: string): void {
  for (const suffix of ["", "-wal", "-shm"]) rmSync(`${file}${suffix}`, { force: true });
}

/** The accounts as a table for a terminal, with the address where they sign in. */
export function demoTable(accounts: readonly DemoAccount[], address: string): string {
  const rows = [
    ["", "address", "password", "name"],
    ...accounts.map(({ role, email, password, name }) => [role, email, password, name]),
  ];
  const widths = [0, 1, 2, 3].map((column) => Math.max(...rows.map((row) => (row[column] ?? "").length)));
  const lines = rows.map((row) =>
    row
      .map((text, column) => text.padEnd(widths[column] ?? 0))
      .join("   ")
      .trimEnd(),
  );
  return [
    "This is the demo: an invented place, for this computer only.",
    `Sign in at ${address}`,
    "",
    ...lines.map((line) => `  ${line}`),
    "",
    "",
  ].join("\n");
}
