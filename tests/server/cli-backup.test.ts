import { existsSync, rmSync } from "node:fs";
import { join } from "node:path";
import Database from "better-sqlite3";
import { afterAll, afterEach, expect, test, vi } from "vitest";
import { lockForServing } from "#server/db/lock.ts";
import { cliFolder, json, quillet, refusal } from "../fixtures/cli.ts";

const { path: folder, remove, file } = cliFolder();
const data = join(folder, "data");
afterAll(remove);
afterEach(() => vi.unstubAllEnvs());

test("what was backed up is there again after the folder was lost, and checks the same", async () => {
  vi.stubEnv("QUILLET_DATA", data);
  json(await quillet(["create-owner", "--email", "ola@example.org", "--name", "Ola"]));
  const before = json(await quillet(["check"]));
  const copy = join(folder, "copies", "one.backup");
  expect(json(await quillet(["backup", copy]))).toMatchObject({ file: copy });
  rmSync(data, { recursive: true });
  expect(json(await quillet(["restore", copy]))).toMatchObject({ setAside: null, check: { ok: true } });
  expect(json(await quillet(["check"]))).toEqual(before);
  const again = await quillet(["create-owner", "--email", "ola@example.org", "--name", "Ola"]);
  expect(refusal(again, 1)).toContain("account-exists");
});

test("the check names a guard that somebody took away, once: opening sets it again", async () => {
  vi.stubEnv("QUILLET_DATA", data);
  const sqlite = new Database(join(data, "quillet.sqlite"));
  sqlite.exec("DROP TRIGGER count_entries_update");
  sqlite.close();
  const found = await quillet(["check"]);
  expect(found.status).toBe(1);
  expect(JSON.parse(found.stdout)).toMatchObject({ ok: false, missingTriggers: ["count_entries_update"] });
  expect(json(await quillet(["check"]))).toMatchObject({ ok: true, missingTriggers: [] });
});

test("each refusal says what to do", async () => {
  vi.stubEnv("QUILLET_DATA", join(folder, "empty"));
  expect(refusal(await quillet(["backup"]), 2)).toContain("quillet backup FILE");
  expect(refusal(await quillet(["restore"]), 2)).toContain("quillet restore FILE");
  expect(refusal(await quillet(["backup", join(folder, "none.backup")]), 1)).toContain("Set QUILLET_DATA");
  expect(refusal(await quillet(["check"]), 1)).toContain("Set QUILLET_DATA");
  expect(refusal(await quillet(["restore", join(folder, "nowhere")]), 1)).toContain("There is no file");
  const text = file("text.backup", "no database");
  expect(refusal(await quillet(["restore", text]), 1)).toContain("Nothing was replaced");
  expect(existsSync(join(folder, "empty", "quillet.sqlite"))).toBe(false);
});

test("nothing is restored under a running server", async () => {
  vi.stubEnv("QUILLET_DATA", data);
  const copy = join(folder, "two.backup");
  json(await quillet(["backup", copy]));
  const unlock = lockForServing(join(data, "quillet.sqlite"));
  expect(refusal(await quillet(["restore", copy]), 1)).toContain("already-served");
  unlock();
});
