import { type ChildProcess, spawn } from "node:child_process";
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, expect, test } from "vitest";

const folder = mkdtempSync(join(tmpdir(), "quillet-served-"));
const children: ChildProcess[] = [];
afterAll(() => {
  for (const child of children) child.kill("SIGKILL");
  rmSync(folder, { recursive: true, force: true });
});

/** A server process on the folder, once it listens or has ended. */
function serve(): Promise<{ child: ChildProcess; said: string; status: number | null }> {
  const env = { ...process.env, QUILLET_DATA: folder, QUILLET_DEMO: "0", QUILLET_PORT: "0", QUILLET_LOG: "silent" };
  const child = spawn(process.execPath, ["--import", "tsx", "server/main.ts"], { env });
  children.push(child);
  return new Promise((resolve) => {
    let said = "";
    const hear = (text: Buffer): void => {
      said += text.toString();
      if (said.includes("Quillet is at")) resolve({ child, said, status: null });
    };
    child.stdout.on("data", hear);
    child.stderr.on("data", hear);
    child.once("exit", (status) => resolve({ child, said, status }));
  });
}

test("a second server on the folder says why it does not start, and one starts after a kill −9", async () => {
  const first = await serve();
  expect(first.status).toBeNull();
  const second = await serve();
  expect(second.status).toBe(1);
  expect(second.said).toContain("Another Quillet serves");
  first.child.kill("SIGKILL");
  await new Promise((resolve) => first.child.once("exit", resolve));
  expect((await serve()).status).toBeNull();
}, 60_000);
