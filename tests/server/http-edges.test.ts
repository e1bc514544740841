import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import type { AddressInfo } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pino } from "pino";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { createSurvey } from "#shared/api/surveys.ts";
import { createApp } from "#server/app.ts";
import { localDay } from "#server/services/local-day.ts";
import { startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";

let server: TestServer;
let team: Team;

beforeAll(async () => {
  server = await startTestServer();
  team = await startTeam(server);
}, 60_000);
afterAll(() => server.stop());

describe("what a server is sent by mistake", () => {
  // The form's last boundary is missing: the parser of multipart forms throws a plain error for it.
  test("an upload that breaks off is the sender's mistake, not a failure of ours", async () => {
    const body = '--edge\r\nContent-Disposition: form-data; name="file"; filename="a.geojson"\r\n\r\n{"type"';
    const reply = await team.planner.fetch(`/api/surveys/${team.surveyId}/areas`, {
      method: "POST",
      headers: { "Content-Type": "multipart/form-data; boundary=edge" },
      body,
    });
    expect([reply.status, ((await reply.json()) as { code: string }).code]).toEqual([400, "input-invalid"]);
  });

  test("a script of an earlier build is not found, which is no failure of ours", async () => {
    const folder = mkdtempSync(join(tmpdir(), "quillet-client-"));
    mkdirSync(join(folder, "assets"));
    writeFileSync(join(folder, "index.html"), "<!doctype html><title>shell</title>");
    const options = { sessionSecret: "s".repeat(40), https: false, clientFolder: folder, signInsPerMinute: 1 };
    const other = createApp(server.platform, options).listen(0, "127.0.0.1");
    await new Promise((resolve) => other.once("listening", resolve));
    const reply = await fetch(`http://127.0.0.1:${(other.address() as AddressInfo).port}/assets/old.js`);
    expect([reply.status, ((await reply.json()) as { code: string }).code]).toEqual([404, "not-found"]);
    await new Promise((resolve) => other.close(resolve));
    rmSync(folder, { recursive: true });
  });
});

describe("behind a proxy", () => {
  const statuses = async (addresses: readonly string[]) => {
    const options = { sessionSecret: "s".repeat(40), https: true, clientFolder: null, signInsPerMinute: 1 };
    const other = createApp(server.platform, options).listen(0, "127.0.0.1");
    await new Promise((resolve) => other.once("listening", resolve));
    const url = `http://127.0.0.1:${(other.address() as AddressInfo).port}/api/session`;
    const codes: number[] = [];
    for (const address of addresses) {
      const headers = { "content-type": "application/json", "x-forwarded-for": address };
      const body = JSON.stringify({ email: "nobody@example.org", password: "not the password" });
      codes.push((await fetch(url, { method: "POST", headers, body })).status);
    }
    other.closeAllConnections();
    await new Promise((resolve) => other.close(resolve));
    return codes;
  };

  // One attempt a minute. The proxy appends the address it saw: what stands before it is anybody's word.
  test("sign-ins are limited for each person's address, as the one proxy saw it", async () => {
    const addresses = ["198.51.100.1", "198.51.100.2", "203.0.113.99, 198.51.100.1"];
    expect(await statuses(addresses)).toEqual([401, 401, 429]);
  });
});

// The pages and the interface that a link in a mail leads to; a log is kept, copied and read by others than the mail.
test("the secret end of a link in a mail is not written to the log", async () => {
  const lines: string[] = [];
  const log = pino({ level: "info" }, { write: (line) => void lines.push(line) });
  const options = { sessionSecret: "s".repeat(40), https: false, clientFolder: null, signInsPerMinute: 10 };
  const other = createApp({ ...server.platform, log }, options).listen(0, "127.0.0.1");
  await new Promise((resolve) => other.once("listening", resolve));
  const url = `http://127.0.0.1:${(other.address() as AddressInfo).port}`;
  const secret = "k".repeat(43);
  const pages = ["/api/invitations", "/api/password-resets", "/invitation", "/reset"];
  for (const page of pages) await fetch(`${url}${page}/${secret}?from=mail`);
  await fetch(`${url}/api/password-resets/${secret}`, { method: "POST", body: "{}" });
  other.closeAllConnections();
  await new Promise((resolve) => other.close(resolve));
  expect(lines).toHaveLength(5);
  expect(lines.join("")).not.toContain(secret);
  for (const page of pages) expect(lines.join("")).toContain(`"url":"${page}/…"`);
});

describe("days", () => {
  // 3 June, 20:00 in Anchorage (UTC − 8 in summer) is 4 June, 04:00 UTC; in Auckland (UTC + 12) 1 January begins at noon.
  test("are those of the people there", () => {
    expect(localDay("2031-06-04T04:00:00Z", "America/Anchorage")).toBe("2031-06-03");
    expect(localDay("2030-12-31T12:30:00.000Z", "Pacific/Auckland")).toBe("2031-01-01");
    expect(localDay("2031-06-04T04:00:00Z", "Nowhere/Such")).toBe("2031-06-04");
  });

  test("a survey begins in a time zone that is known", async () => {
    const names = { name: "A", targetSingular: "nest", targetPlural: "nests", countingRule: "", seasonName: "2031" };
    const body = { ...names, wholeNumbers: true, safetyNotes: "", timeZone: "Nowhere/Such" };
    expect((await team.planner.call(createSurvey, { body })).json.code).toBe("input-invalid");
    expect((await team.planner.call(createSurvey, { body: { ...body, timeZone: "Europe/London" } })).status).toBe(200);
  });
});
