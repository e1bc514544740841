import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { signIn } from "#shared/api/accounts.ts";
import { requestReset, useReset as setByLink } from "#shared/api/people.ts";
import { insertFailure } from "#server/db/sign-in-failures.ts";
import { writeTx } from "#server/db/open.ts";
import { checkPassword } from "#server/services/check-password.ts";
import { forgetEnded } from "#server/services/end-sessions.ts";
import { secretTo } from "../fixtures/mails.ts";
import { PASSWORD, startTestServer, type TestServer } from "../fixtures/server.ts";

let server: TestServer;
let count = 0;
let email = "";

beforeAll(async () => {
  server = await startTestServer();
}, 60_000);
beforeEach(async () => {
  server.setNow("2031-05-02T08:00:00.000Z");
  server.platform.db.$client.exec("DELETE FROM sign_in_failures");
  count += 1;
  email = `person-${count}@example.org`;
  await server.person(email);
});
afterAll(() => server.stop());

const tryWith = (password: string, address = email) =>
  server.client().call(signIn, { body: { email: address, password } });
/** Failures as refused sign-ins leave them; each would take a password's work. */
function failed(times: number, one: { email?: string; source?: string; at?: string }): void {
  const row = { email, source: "198.51.100.7", at: server.platform.now().toISOString(), ...one };
  writeTx(server.platform.db, (tx) => {
    for (let n = 0; n < times; n += 1) insertFailure(tx, row);
  });
}
const from = (source: string, address: string, password = PASSWORD) =>
  checkPassword(server.platform, { email: address, password, source });

describe("wrong passwords for one address", () => {
  test("ten within a quarter of an hour make it wait, even for the right one, in kind words with a way out", async () => {
    for (let n = 0; n < 10; n += 1) expect((await tryWith(`guess number ${n}`)).json.code).toBe("sign-in-refused");
    const waiting = await tryWith(PASSWORD);
    expect(waiting.status).toBe(429);
    expect(waiting.json.code).toBe("too-many-requests");
    expect(waiting.json.detail).toContain("again in 15 minutes");
    expect(waiting.json.detail).toContain("a link to set a new one works meanwhile");
  }, 20_000);

  test("wait alike for an address without an account", async () => {
    failed(10, { email: "nobody@example.org" });
    expect((await tryWith(PASSWORD, "nobody@example.org")).json.detail).toContain("again in 15 minutes");
  });

  test("wait until the oldest of the ten is a quarter of an hour old, and no longer for trying meanwhile", async () => {
    failed(1, { at: "2031-05-02T07:50:00.000Z" });
    failed(9, {});
    expect((await tryWith("x")).json.detail).toContain("again in 5 minutes");
    server.setNow("2031-05-02T08:04:59.999Z");
    expect((await tryWith(PASSWORD)).json.detail).toContain("again in a minute");
    server.setNow("2031-05-02T08:05:00.000Z");
    expect((await tryWith(PASSWORD)).status).toBe(200);
  });

  test("are forgotten after a right one", async () => {
    failed(9, {});
    expect((await tryWith(PASSWORD)).status).toBe(200);
    expect((await tryWith("x")).json.code).toBe("sign-in-refused");
    expect((await tryWith(PASSWORD)).status).toBe(200);
  });

  test("many at the same moment don't slip through: ten are looked at", async () => {
    const replies = await Promise.all(Array.from({ length: 25 }, (_, n) => tryWith(`guess number ${n}`)));
    const codes = replies.map((reply) => reply.json.code);
    expect(codes.filter((code) => code === "sign-in-refused")).toHaveLength(10);
    expect(codes.filter((code) => code === "too-many-requests")).toHaveLength(15);
  }, 20_000);

  test("the wait ends with a new password by a link", async () => {
    failed(10, {});
    await server.client().call(requestReset, { body: { email } });
    const secret = secretTo(server, email, "reset");
    const body = { password: "another long sentence" };
    expect((await server.client().call(setByLink, { params: { secret }, body })).status).toBe(200);
    expect((await tryWith("another long sentence")).status).toBe(200);
  });

  test("one address waits, another from the same place does not", async () => {
    failed(10, { source: "127.0.0.1" });
    const neighbour = `neighbour-${count}@example.org`;
    await server.person(neighbour);
    expect((await tryWith(PASSWORD, neighbour)).status).toBe(200);
  });
});

describe("wrong passwords from one network address", () => {
  test("fifty for many accounts make it wait; others are let in", async () => {
    for (let n = 0; n < 50; n += 1) failed(1, { email: `guessed-${n}@example.org`, source: "198.51.100.9" });
    await expect(from("198.51.100.9", email)).rejects.toThrow("again in 15 minutes");
    expect((await from("198.51.100.10", email)).email).toBe(email);
  });

  test("a right one of one's own does not wash away failures with other addresses", async () => {
    for (let n = 0; n < 50; n += 1) {
      failed(1, {
        email: `guessed-${n}@example.org`,
        source: "198.51.100.9",
        at: `2031-05-02T07:59:${String(n).padStart(2, "0")}.000Z`,
      });
    }
    failed(0, {});
    server.platform.db.$client.exec("DELETE FROM sign_in_failures WHERE email = 'guessed-0@example.org'");
    expect((await from("198.51.100.9", email)).email).toBe(email);
    await expect(from("198.51.100.9", "guessed-1@example.org", "x")).rejects.toThrow("Check both");
    await expect(from("198.51.100.9", email)).rejects.toThrow("again in");
  });
});

test("failures older than the limits look back are forgotten by the round", () => {
  failed(1, { at: "2031-05-02T07:45:00.000Z" });
  failed(1, { at: "2031-05-02T07:45:00.001Z" });
  forgetEnded(server.platform);
  const left = server.platform.db.$client.prepare("SELECT at FROM sign_in_failures").pluck().all();
  expect(left).toEqual(["2031-05-02T07:45:00.001Z"]);
});
