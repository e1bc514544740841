import { createHash } from "node:crypto";
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { readSession, signIn } from "#shared/api/accounts.ts";
import {
  changePassword,
  endOtherSessions,
  endSession,
  listSessions,
  requestReset,
  useReset as setByLink,
} from "#shared/api/people.ts";
import { forgetEnded } from "#server/services/end-sessions.ts";
import { secretTo } from "../fixtures/mails.ts";
import { type Client, PASSWORD, startTestServer, type TestServer } from "../fixtures/server.ts";

let server: TestServer;
let person: Client;
let other: Client;
let count = 0;
let email = "";
const NEXT = "another long sentence";

beforeAll(async () => {
  server = await startTestServer();
}, 60_000);
beforeEach(async () => {
  server.setNow("2031-05-02T08:00:00.000Z");
  count += 1;
  email = `person-${count}@example.org`;
  person = await server.person(email);
  server.setNow("2031-05-02T09:00:00.000Z");
  other = await server.signedIn(email);
});
afterAll(() => server.stop());

const list = async (client = person) => (await client.call(listSessions)).json.sessions;
const isIn = async (client: Client) => (await client.call(readSession)).json.account !== null;
const change = (client: Client, current = PASSWORD, next = NEXT) =>
  client.call(changePassword, { body: { current, next } });

describe("the list of sessions", () => {
  test("names each by a hash, the latest used first, and marks the one that asks", async () => {
    const sessions = await list(other);
    expect(sessions.map(({ startedAt, isThis }) => [startedAt, isThis])).toEqual([
      ["2031-05-02T09:00:00.000Z", true],
      ["2031-05-02T08:00:00.000Z", false],
    ]);
    const ids = server.platform.db.$client
      .prepare(
        "SELECT s.id FROM sessions s JOIN accounts a ON a.id = s.account_id WHERE a.email = ? ORDER BY s.created_at DESC",
      )
      .pluck()
      .all(email) as string[];
    expect(sessions.map(({ handle }) => handle)).toEqual(
      ids.map((id) => createHash("sha256").update(id).digest("hex")),
    );
    expect(JSON.stringify(sessions)).not.toContain(ids[0]);
  });

  test("tells when each was last used, to the minute", async () => {
    await person.call(readSession);
    server.setNow("2031-05-02T09:00:59.999Z");
    expect((await list())[0]?.lastSeenAt).toBe("2031-05-02T09:00:00.000Z");
    server.setNow("2031-05-02T09:01:00.000Z");
    expect((await list()).find(({ isThis }) => isThis)?.lastSeenAt).toBe("2031-05-02T09:01:00.000Z");
  });

  test("one is ended by its name, from anywhere", async () => {
    const handle = (await list()).find(({ isThis }) => !isThis)?.handle ?? "";
    const reply = await person.call(endSession, { params: { handle } });
    expect(reply.json.sessions).toHaveLength(1);
    expect([await isIn(person), await isIn(other)]).toEqual([true, false]);
    expect((await person.call(endSession, { params: { handle } })).json.code).toBe("not-found");
  });

  test("nobody ends a session of somebody else", async () => {
    const stranger = await server.person(`stranger-${count}@example.org`);
    const handle = (await list())[0]?.handle ?? "";
    expect((await stranger.call(endSession, { params: { handle } })).json.code).toBe("not-found");
    expect([await isIn(person), await isIn(other)]).toEqual([true, true]);
  });

  test("all others are ended at once", async () => {
    const third = await server.signedIn(email);
    expect((await person.call(endOtherSessions)).json.sessions).toMatchObject([{ isThis: true }]);
    expect([await isIn(person), await isIn(other), await isIn(third)]).toEqual([true, false, false]);
  });

  test("expired ones are deleted by the round, and no others", async () => {
    // 14 days after 08:00 the first has ended; that of 09:00 has an hour left.
    server.setNow("2031-05-16T08:00:00.000Z");
    const kept = () =>
      server.platform.db.$client
        .prepare("SELECT count(*) FROM sessions s JOIN accounts a ON a.id = s.account_id WHERE a.email = ?")
        .pluck()
        .get(email);
    expect(kept()).toBe(2);
    forgetEnded(server.platform);
    expect(kept()).toBe(1);
    expect([await isIn(person), await isIn(other)]).toEqual([false, true]);
  });
});

describe("a changed password", () => {
  test("ends every other session and leaves this one", async () => {
    expect((await change(person)).json.account?.email).toBe(email);
    expect([await isIn(person), await isIn(other)]).toEqual([true, false]);
    const tried = await server.client().call(signIn, { body: { email, password: PASSWORD } });
    expect(tried.json.code).toBe("sign-in-refused");
    expect((await server.client().call(signIn, { body: { email, password: NEXT } })).status).toBe(200);
  });

  test("needs the present one, and a new one by the rules; else nothing ends", async () => {
    expect((await change(person, "not the present one")).json.code).toBe("password-wrong");
    expect((await change(person, PASSWORD, "short")).json.code).toBe("password-too-short");
    expect((await change(person, PASSWORD, "qwertyuiop2031!")).json.code).toBe("password-common");
    expect([await isIn(person), await isIn(other)]).toEqual([true, true]);
  });

  test("ends a link to set one that was on its way", async () => {
    await server.client().call(requestReset, { body: { email } });
    const secret = secretTo(server, email, "reset");
    await change(person);
    const used = await server
      .client()
      .call(setByLink, { params: { secret }, body: { password: "a third long sentence" } });
    expect(used.json.code).toBe("link-ended");
  });

  // A wrong present password counts like one at signing in, so an open tab is no way around the limits.
  test("can't be tried without end from an open tab", async () => {
    for (let n = 0; n < 10; n += 1) await change(person, `guess number ${n}`);
    expect((await change(person)).json.code).toBe("too-many-requests");
  }, 20_000);
});
