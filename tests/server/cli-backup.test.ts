import { existsSync, rmSync } from "node:fs";
import { join } from "node:path";
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
