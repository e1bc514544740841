import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test, vi } from "vitest";
import { findAccountByEmail } from "#server/db/accounts.ts";
import { closeDb, type Db, openDb } from "#server/db/open.ts";
import { surveysOf } from "#server/db/surveys.ts";
import { demoTable, ensureDemo } from "#server/demo.ts";
import { type Env, readEnv } from "#server/env.ts";
import { type Jobs, startJobs } from "#server/jobs/jobs.ts";
import { buildRecord } from "#server/services/build-record.ts";
import { checkPassword } from "#server/services/check-password.ts";
import type { DemoAccount } from "#server/services/demo/people.ts";
import { heathFile } from "#server/services/demo/heath.ts";
import { readArea } from "#shared/exchange/read-area.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import { replay } from "#shared/record/replay.ts";

vi.setConfig({ testTimeout: 60_000, hookTimeout: 120_000 });

const KEY = "33".repeat(32);
let folder = "";
let env: Env;
let jobs: Jobs;
let accounts: readonly DemoAccount[];
let db: Db;
let record: RecordFile;

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), "quillet-demo-"));
  env = readEnv({ QUILLET_DEMO: "1", QUILLET_DATA: folder }, folder);
  jobs = startJobs();
  writeFileSync(`${env.databaseFile}.part`, "a start that was broken off");
  accounts = (await ensureDemo(env, { jobs, signingKey: KEY, version: "0.0.0-test" })) ?? [];
  db = openDb(env.databaseFile);
  const planner = findAccountByEmail(db, "planner@example.org");
  const [survey] = surveysOf(db, planner?.id ?? "");
  if (!survey) throw new Error("the demo has no survey");
  record = buildRecord({ db, now: () => new Date(), signingKey: KEY, version: "0.0.0-test" }, survey.id);
});

afterAll(async () => {
  closeDb(db);
  await jobs.close();
  rmSync(folder, { recursive: true, force: true });
});

describe("the demo", () => {
  test("has an owner and one account a role, whose passwords stand in a file that only this user reads", async () => {
    expect(accounts.map(({ role }) => role)).toEqual(["owner", "planner", "lead", "counter", "auditor"]);
    const file = join(folder, "demo-accounts.json");
    expect(statSync(file).mode & 0o777).toBe(0o600);
    expect(JSON.parse(readFileSync(file, "utf8"))).toEqual(accounts);
    expect(new Set(accounts.map(({ password }) => password)).size).toBe(5);
    for (const { email, password, role } of accounts) {
      const platform = { db, now: () => new Date(), random: (bytes: number) => new Uint8Array(bytes) };
      const tried = { email, password, source: "here" };
      const account = await checkPassword(platform as Parameters<typeof checkPassword>[0], tried);
      expect(account.isOwner).toBe(role === "owner");
    }
  });

  test("is a heath with one hole and some hundreds of cells", () => {
    const { report } = readArea(heathFile(), {}, {}).value;
    expect(report).toMatchObject({ parts: 1, holes: 1, mended: [], ignored: [] });
    expect(report.vertices).toBeGreaterThan(80);
    const [frame] = record.frames;
    expect(frame?.statement["units"]).toBeGreaterThan(300);
    expect(frame?.statement["units"]).toBeLessThan(1000);
  });

  test("has a draw of forty picks with repeats", () => {
    const entries = record.draws[0]?.lists[0]?.entries ?? [];
    const picks = entries.filter(({ reserve }) => !reserve);
    expect(picks).toHaveLength(40);
    expect(picks.some(({ repeatOf }) => repeatOf !== null)).toBe(true);
    expect(entries.length).toBe(48);
  });

  test("has half its counts, zeros among them, and one unsafe cell whose reserve is opened", () => {
    const inForce = record.counts.filter(({ id }) => !record.counts.some(({ replaces }) => replaces === id));
    const counted = inForce.filter(({ state }) => state === "counted");
    expect(counted.length).toBeGreaterThanOrEqual(16);
    expect(counted.length).toBeLessThanOrEqual(20);
    expect(counted.some(({ value }) => value === 0)).toBe(true);
    expect(Math.max(...counted.map(({ value }) => value ?? 0))).toBeGreaterThan(4);
    expect(inForce.filter(({ state }) => state === "unsafe")).toHaveLength(1);
    const closed = record.events.filter(({ envelope }) => envelope.kind === "pick-closed");
    expect(closed).toHaveLength(1);
    expect(closed[0]?.payload["opened"]).not.toEqual([]);
    expect(new Set(record.assignments.map(({ member }) => member)).size).toBe(2);
  });

  test("tells a story of less than a fortnight that ends before now", () => {
    const times = record.events.map(({ envelope }) => Date.parse(envelope.at));
    expect(times).toEqual(times.toSorted((a, b) => a - b));
    expect(Math.max(...times)).toBeLessThan(Date.now());
    expect((Math.max(...times) - Math.min(...times)) / 86_400_000).toBeGreaterThan(7);
    expect((Date.now() - Math.min(...times)) / 86_400_000).toBeLessThan(15);
  });

  test("replays from its record and its boundary file without a failure", () => {
    const { checks } = replay(record, { sourceFile: heathFile() });
    expect(checks.filter(({ outcome }) => outcome === "failed")).toEqual([]);
    const open = checks.filter(({ outcome }) => outcome === "not-checked").map(({ id }) => id);
    expect(open).toEqual(["held-hashes"]);
  });

  test("is not filled again by a second start, which gives the same accounts", async () => {
    const before = readFileSync(env.databaseFile);
    const begun = performance.now();
    const again = await ensureDemo(env, { jobs, signingKey: KEY, version: "0.0.0-test" });
    expect(performance.now() - begun).toBeLessThan(5000);
    expect(again).toEqual(accounts);
    expect(readFileSync(env.databaseFile).length).toBe(before.length);
  });

  test("is printed as a table with the address", () => {
    const table = demoTable(accounts, "http://127.0.0.1:3000/");
    expect(table).toContain("Sign in at http://127.0.0.1:3000/");
    for (const { email, password } of accounts) expect(table).toMatch(new RegExp(`${email} +${password}`));
  });
});

test("real mode is never filled", async () => {
  const real = readEnv({ QUILLET_DATA: join(folder, "real") }, folder);
  expect(await ensureDemo(real, { jobs, signingKey: KEY, version: "0.0.0-test" })).toBeNull();
  expect(() => statSync(join(folder, "real"))).toThrow("ENOENT");
});
