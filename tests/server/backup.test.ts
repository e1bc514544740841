import { copyFileSync, existsSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import Database from "better-sqlite3";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { requestReset } from "#shared/api/people.ts";
import { createSurvey } from "#shared/api/surveys.ts";
import { allEvents } from "#server/db/events.ts";
import { lockForServing } from "#server/db/lock.ts";
import { closeDb, openDb } from "#server/db/open.ts";
import { backUp } from "#server/services/back-up.ts";
import { checkInstallation } from "#server/services/check-installation.ts";
import { copiesIn, dailyBackup, noLongerKept } from "#server/services/daily-backup.ts";
import { restoreBackup } from "#server/services/restore-backup.ts";
import { startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";
import { runWholeSurvey } from "../fixtures/whole-survey.ts";

const MADE_AT = "2031-05-02T08:00:00.000Z";
let server: TestServer;
let team: Team;
let folder: string;

beforeAll(async () => {
  server = await startTestServer();
  team = await startTeam(server);
  await runWholeSurvey(server, team);
  folder = mkdtempSync(join(tmpdir(), "quillet-backup-"));
}, 120_000);
afterAll(async () => {
  await server.stop();
  rmSync(folder, { recursive: true, force: true });
});

const place = (name: string) => ({
  databaseFile: join(folder, `${name}.sqlite`),
  signingKeyFile: join(folder, `${name}-signing-key`),
  signingKeyGiven: undefined,
  version: "0.0.0-test",
  now: () => new Date("2031-05-03T08:00:00.000Z"),
});
const taken = (name: string): string => {
  const file = join(folder, name);
  const { signingKey, db } = server.platform;
  backUp({ databaseFile: db.$client.name, file, signingKey, madeAt: MADE_AT });
  return file;
};

describe("a backup", () => {
  test("restores to what the check of the whole installation finds equal", () => {
    const file = taken("quiet.backup");
    const restored = restoreBackup(file, place("quiet"));
    expect(restored.check).toEqual(checkInstallation(server.platform));
    expect(restored.check).toMatchObject({ ok: true, database: { damage: [], brokenForeignKeys: 0 } });
    expect(restored).toMatchObject({ madeAt: MADE_AT, setAside: null });
    expect(readFileSync(place("quiet").signingKeyFile, "utf8")).toBe(server.platform.signingKey);
  });

  test("taken under write load it holds one moment, whole, whose chain the live one goes on from", async () => {
    const load = { goesOn: true };
    const written = (async () => {
      for (let n = 0; load.goesOn; n += 1) {
        await team.planner.call(createSurvey, { body: { ...NEW_SURVEY, name: `written meanwhile ${n}` } });
      }
    })();
    const databaseFile = server.platform.db.$client.name;
    const files = [];
    for (const name of ["load-1.backup", "load-2.backup", "load-3.backup"]) {
      const file = join(folder, name);
      const { signingKey } = server.platform;
      await server.platform.jobs.run("back-up", { databaseFile, file, signingKey, madeAt: MADE_AT });
      files.push(file);
    }
    load.goesOn = false;
    await written;
    const live = new Map(checkInstallation(server.platform).surveys.map((survey) => [survey.id, survey]));
    for (const [n, file] of files.entries()) {
      const { check } = restoreBackup(file, place(`load-${n}`));
      expect(check.ok).toBe(true);
      for (const survey of check.surveys) expect(live.get(survey.id)).toEqual(survey);
    }
  }, 60_000);

  test("is for nobody else to read, and never written over another file", () => {
    const file = taken("private.backup");
    expect(statSync(file).mode & 0o777).toBe(0o600);
    expect(() => taken("private.backup")).toThrow(/is there/);
  });

  test("that fails leaves no half of a file", () => {
    const text = join(folder, "text.sqlite");
    writeFileSync(
      text,
      "not a database, though it has more than the hundred bytes that SQLite's header takes".repeat(9),
    );
    const file = join(folder, "failed.backup");
    expect(() => backUp({ databaseFile: text, file, signingKey: "11".repeat(32), madeAt: MADE_AT })).toThrow(
      /not a database/,
    );
    expect([file, `${file}.part`].filter((name) => existsSync(name))).toEqual([]);
  });
});

const NEW_SURVEY = {
  targetSingular: "burrow",
  targetPlural: "burrows",
  countingRule: "",
  wholeNumbers: true,
  seasonName: "2031",
  timeZone: "Europe/Berlin",
  safetyNotes: "",
};

describe("restoring", () => {
  test("sets aside what was there", () => {
    const target = place("twice");
    restoreBackup(taken("first.backup"), target);
    const { setAside } = restoreBackup(taken("second.backup"), target);
    expect(setAside).toBe(`${target.databaseFile}.before-2031-05-03T08-00-00-000Z`);
    expect(existsSync(setAside ?? "")).toBe(true);
  });

  test("refuses a file that is no backup, and a plain database", () => {
    const text = join(folder, "text.backup");
    writeFileSync(text, "not a database");
    expect(() => restoreBackup(text, place("none"))).toThrow(/no backup/);
    const plain = join(folder, "plain.backup");
    closeDb(openDb(plain));
    expect(() => restoreBackup(plain, place("none"))).toThrow(/no backup/);
    expect(existsSync(place("none").databaseFile)).toBe(false);
  });

  // One count is changed in the file, by somebody who took the guards away.
  test("refuses a backup whose record was changed, and replaces nothing", () => {
    const target = place("kept");
    restoreBackup(taken("good.backup"), target);
    const before = readFileSync(target.databaseFile);
    const forged = join(folder, "forged.backup");
    copyFileSync(taken("to-forge.backup"), forged);
    const sqlite = new Database(forged);
    sqlite.exec("DROP TRIGGER count_entries_update");
    sqlite.exec("UPDATE count_entries SET value = value + 1 WHERE state = 'counted'");
    sqlite.close();
    expect(() => restoreBackup(forged, target)).toThrow(/It is not whole: .*Nothing was replaced/);
    expect(readFileSync(target.databaseFile).equals(before)).toBe(true);
  });

  // The first page of the table of memberships, which SQLite reads while it checks foreign keys.
  test("refuses a damaged file with SQLite's words, and replaces nothing", () => {
    const damaged = taken("damaged.backup");
    const sqlite = new Database(damaged, { readonly: true });
    const page = sqlite
      .prepare("SELECT rootpage FROM sqlite_master WHERE name = 'memberships'")
      .pluck()
      .get() as number;
    const size = sqlite.pragma("page_size", { simple: true }) as number;
    sqlite.close();
    const bytes = readFileSync(damaged);
    bytes.fill(0xff, (page - 1) * size, page * size);
    writeFileSync(damaged, bytes);
    expect(() => restoreBackup(damaged, place("damaged"))).toThrow(
      /It is not whole: .*malformed.* Nothing was replaced/,
    );
    expect(existsSync(place("damaged").databaseFile)).toBe(false);
  });

  // The people of the team are signed in while the backup is made; the secret of their cookies is not in it and stays.
  test("brings back no session and no link to set a password: they may have been ended since", async () => {
    await server.client().call(requestReset, { body: { email: "counter@example.org" } });
    const rows = (file: string) => {
      const sqlite = new Database(file, { readonly: true });
      const found = ["sessions", "password_resets"].map((table) =>
        Number(sqlite.prepare(`SELECT count(*) FROM ${table}`).pluck().get()),
      );
      sqlite.close();
      return found;
    };
    expect(rows(server.platform.db.$client.name)).not.toContain(0);
    restoreBackup(taken("sessions.backup"), place("sessions"));
    expect(rows(place("sessions").databaseFile)).toEqual([0, 0]);
  });

  test("refuses where the environment gives another signing key: the server would sign with that one", () => {
    const file = taken("key.backup");
    const target = { ...place("key"), signingKeyGiven: "22".repeat(32) };
    expect(() => restoreBackup(file, target)).toThrow(/QUILLET_SIGNING_KEY/);
    expect(existsSync(target.databaseFile)).toBe(false);
    expect(restoreBackup(file, { ...target, signingKeyGiven: server.platform.signingKey }).check.ok).toBe(true);
  });

  test("refuses while a server runs on the place", () => {
    const target = place("served");
    const unlock = lockForServing(target.databaseFile);
    expect(() => restoreBackup(taken("served.backup"), target)).toThrow(/Another Quillet serves/);
    unlock();
    expect(restoreBackup(join(folder, "served.backup"), target).check.ok).toBe(true);
  });
});

test("the check names a survey whose chain is broken", () => {
  const target = place("broken");
  restoreBackup(taken("broken.backup"), target);
  const db = openDb(target.databaseFile);
  db.$client.exec("DROP TRIGGER events_update");
  db.$client.prepare("UPDATE events SET signature = ? WHERE sequence = 3").run("0".repeat(128));
  const { ok, surveys } = checkInstallation({ ...server.platform, db });
  const whole = allEvents(db, team.surveyId).length;
  closeDb(db);
  expect(ok).toBe(false);
  expect(surveys.find(({ id }) => id === team.surveyId)).toMatchObject({ events: whole, checks: { failed: 1 } });
});

describe("daily copies", () => {
  test("are one a day", async () => {
    const copies = join(folder, "daily");
    const task = { databaseFile: server.platform.db.$client.name, folder: copies };
    const on = (day: string) => dailyBackup({ ...server.platform, now: () => new Date(`2031-05-${day}`) }, task);
    await on("02T08:00:00Z");
    await on("02T23:59:00Z");
    await on("03T00:01:00Z");
    expect(copiesIn(copies).map(({ name }) => name)).toEqual([
      "quillet-2031-05-03.backup",
      "quillet-2031-05-02.backup",
    ]);
  });

  // Sixty days from 1 March 2031 on: the newest 14 stay, and 1 March and 1 April as the first of their months.
  test("are kept for 14 days, and the first of each month for a year", () => {
    const start = Date.UTC(2031, 2, 1);
    const names = Array.from({ length: 60 }, (_, day) => {
      return `quillet-${new Date(start + day * 86_400_000).toISOString().slice(0, 10)}.backup`;
    }).toReversed();
    const old = noLongerKept(names);
    const kept = names.filter((name) => !old.includes(name));
    expect(kept).toHaveLength(16);
    expect(kept.slice(14)).toEqual(["quillet-2031-04-01.backup", "quillet-2031-03-01.backup"]);
  });
});

test("a second server on one database is refused, and may serve once the first has ended", () => {
  const file = join(folder, "one.sqlite");
  const unlock = lockForServing(file);
  expect(() => lockForServing(file)).toThrow(/Another Quillet serves/);
  unlock();
  lockForServing(file)();
});
