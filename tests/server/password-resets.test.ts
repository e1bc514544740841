import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { readSession, signIn } from "#shared/api/accounts.ts";
import { changeAccount, listAccounts, sendReset } from "#shared/api/installation.ts";
import { readReset, requestReset, useReset as setByLink } from "#shared/api/people.ts";
import { mailsTo, mailTo, secretTo } from "../fixtures/mails.ts";
import { type Client, PASSWORD, startTestServer, type TestServer } from "../fixtures/server.ts";

let server: TestServer;
let owner: Client;
let person: Client;
let count = 0;
let email = "";
const NEXT = "another long sentence";

beforeAll(async () => {
  server = await startTestServer();
  owner = await server.person("owner@example.org", { isOwner: true });
}, 60_000);
beforeEach(async () => {
  server.setNow("2031-05-02T08:00:00.000Z");
  count += 1;
  email = `person-${count}@example.org`;
  person = await server.person(email);
});
afterAll(() => server.stop());

const ask = (address = email) => server.client().call(requestReset, { body: { email: address } });
const newest = () => secretTo(server, email, "reset");
const use = (secret: string, password = NEXT, client = server.client()) =>
  client.call(setByLink, { params: { secret }, body: { password } });
const signsIn = async (password: string) =>
  (await server.client().call(signIn, { body: { email, password } })).status === 200;
const accountId = async () =>
  (await owner.call(listAccounts)).json.accounts.find((account) => account.email === email)?.id ?? "";

describe("a link to set a new password", () => {
  test("is asked for alike by an address with an account and one without, and only the first gets a mail", async () => {
    const [known, unknown] = [await ask(), await ask("nobody@example.org")];
    expect(known.status).toBe(200);
    expect([known.status, known.json]).toEqual([unknown.status, unknown.json]);
    expect(mailsTo(server, "nobody@example.org")).toEqual([]);
    const mail = mailTo(server, email);
    expect(mail).toMatchObject({ kind: "reset", secret: true, surveyId: null });
    expect(mail.text).toContain("It works once, until 2031-05-02 10:00 UTC.");
  });

  // Both wait for the same 150 ms, within which the work of either fits.
  test("is answered after as long whether or not there is an account", async () => {
    for (const address of [email, "nobody@example.org"]) {
      const start = performance.now();
      await ask(address);
      expect(performance.now() - start, address).toBeGreaterThanOrEqual(145);
    }
  });

  test("sets it, ends every session, signs in, and works once", async () => {
    await ask();
    const secret = newest();
    expect((await server.client().call(readReset, { params: { secret } })).json).toEqual({
      email,
      expiresAt: "2031-05-02T10:00:00.000Z",
    });
    const client = server.client();
    expect((await use(secret, NEXT, client)).json.account?.email).toBe(email);
    expect((await client.call(readSession)).json.account?.email).toBe(email);
    expect((await person.call(readSession)).json.account).toBeNull();
    expect([await signsIn(PASSWORD), await signsIn(NEXT)]).toEqual([false, true]);
    expect((await use(secret)).json.code).toBe("link-ended");
    expect((await server.client().call(readReset, { params: { secret } })).status).toBe(410);
    expect(mailTo(server, email).text).not.toContain(secret);
  });

  test("clicked twice at the same moment it works once", async () => {
    await ask();
    const secret = newest();
    const replies = await Promise.all([use(secret, "the first of two words"), use(secret, "the second of two words")]);
    expect(replies.map((reply) => reply.status).toSorted((a, b) => a - b)).toEqual([200, 410]);
  });

  test("has ended after two hours, to the millisecond", async () => {
    await ask();
    const secret = newest();
    server.setNow("2031-05-02T10:00:00.000Z");
    expect((await use(secret)).json.code).toBe("link-ended");
    server.setNow("2031-05-02T09:59:59.999Z");
    expect((await use(secret)).status).toBe(200);
  });

  test("ends those before", async () => {
    await ask();
    const first = newest();
    server.setNow("2031-05-02T08:01:00.000Z");
    await ask();
    expect((await use(first)).json.code).toBe("link-ended");
    expect((await use(newest())).status).toBe(200);
  });

  test("is written three times an hour at most to one address, and the answer does not tell", async () => {
    for (let n = 0; n < 5; n += 1) expect((await ask()).status).toBe(200);
    expect(mailsTo(server, email)).toHaveLength(3);
    server.setNow("2031-05-02T09:00:00.000Z");
    await ask();
    expect(mailsTo(server, email)).toHaveLength(4);
  });

  test("holds the new password to the rules, and stays open until it fits", async () => {
    await ask();
    const secret = newest();
    expect((await use(secret, "short")).json.code).toBe("password-too-short");
    expect((await use(secret, "passwordpassword")).json.code).toBe("password-common");
    expect((await use(secret, email)).json.code).toBe("password-common");
    expect((await use(secret)).status).toBe(200);
  });

  test("is sent at an owner's wish, who is told when there were enough", async () => {
    const params = { accountId: await accountId() };
    for (let n = 0; n < 3; n += 1) expect((await owner.call(sendReset, { params })).status).toBe(200);
    expect((await owner.call(sendReset, { params })).json.code).toBe("too-many-requests");
    expect((await use(secretTo(server, email, "reset"))).status).toBe(200);
    expect((await owner.call(sendReset, { params: { accountId: "nobody" } })).json.code).toBe("account-not-found");
  });

  test("is not written to a closed account, and one that is on its way ends with it", async () => {
    await ask();
    const secret = newest();
    const params = { accountId: await accountId() };
    await owner.call(changeAccount, { params, body: { isOwner: false, closed: true } });
    expect((await use(secret)).json.code).toBe("link-ended");
    await ask();
    expect(mailsTo(server, email)).toHaveLength(1);
    expect((await owner.call(sendReset, { params })).json.code).toBe("account-closed");
  });
});
