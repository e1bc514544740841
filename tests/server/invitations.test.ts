import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import type { Role } from "#shared/access/table.ts";
import { readSession, signIn } from "#shared/api/accounts.ts";
import { changeAccount, inviteAccount, listAccounts, withdrawAccountInvitation } from "#shared/api/installation.ts";
import {
  acceptInvitation,
  addPerson,
  listPeople,
  readInvitation,
  renewInvitation,
  setRoles,
  withdrawInvitation,
} from "#shared/api/people.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { keyFingerprint, publicKeyOf } from "#shared/record/sign.ts";
import { allEvents } from "#server/db/events.ts";
import { mailsTo, mailTo, secretTo } from "../fixtures/mails.ts";
import { anotherSurvey } from "../fixtures/sealed-frame.ts";
import { PASSWORD, startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";

let server: TestServer;
let people: Team;
let team: Team;
let count = 0;
let email = "";
const here = () => ({ surveyId: team.surveyId });
const START = "2031-05-02T08:00:00.000Z";

beforeAll(async () => {
  server = await startTestServer();
  people = await startTeam(server);
}, 60_000);
beforeEach(async () => {
  server.setNow(START);
  team = await anotherSurvey(people);
  count += 1;
  email = `new-${count}@example.org`;
});
afterAll(() => server.stop());

const add = (role: "planner" | "lead" | "counter" | "auditor" = "counter", address = email) =>
  team.planner.call(addPerson, { params: here(), body: { email: address, role } });
async function invited(role: Parameters<typeof add>[0] = "counter"): Promise<string> {
  const reply = await add(role);
  expect(reply.status).toBe(200);
  return secretTo(server, email, "invitation");
}
const accept = (secret: string, body = { name: "Nia Brandt", password: PASSWORD }, client = server.client()) =>
  client.call(acceptInvitation, { params: { secret }, body });
const read = (secret: string) => server.client().call(readInvitation, { params: { secret } });
const list = async () => (await team.planner.call(listPeople, { params: here() })).json;

describe("an invitation", () => {
  test("goes to an address without an account, by a mail that says to what, by whom, and until when", async () => {
    const { invitations, members } = (await add("lead")).json;
    expect(members.map((member) => member.email)).not.toContain(email);
    // 14 days after 2 May is 16 May.
    expect(invitations).toMatchObject([
      {
        email,
        role: "lead",
        invitedBy: "Planner",
        expiresAt: "2031-05-16T08:00:00.000Z",
        expired: false,
        mail: "kept",
      },
    ]);
    const mail = mailTo(server, email);
    expect(mail).toMatchObject({ kind: "invitation", secret: true, surveyId: team.surveyId });
    expect(mail.subject).toBe("Hallow Moss: you are invited as lead");
    expect(mail.text).toContain("Planner invites you to the survey “Hallow Moss” as its lead.");
    expect(mail.text).toContain("It works once, until 2031-05-16 08:00 UTC.");
    expect(mail.text).not.toContain("fingerprint");
  });

  test("tells an auditor the fingerprint of the key, in the mail and on the page", async () => {
    const secret = await invited("auditor");
    const fingerprint = keyFingerprint(publicKeyOf(server.platform.signingKey));
    expect(mailTo(server, email).text).toContain(fingerprint);
    expect((await read(secret)).json).toEqual({
      email,
      survey: "Hallow Moss",
      role: "auditor",
      makesOwner: false,
      invitedBy: "Planner",
      expiresAt: "2031-05-16T08:00:00.000Z",
      hasAccount: false,
      keyFingerprint: fingerprint,
    });
  });

  test("of its link only the hash is in the database, but for the mail that waits", async () => {
    const secret = await invited();
    const rows = server.platform.db.$client.prepare("SELECT * FROM invitations WHERE email = ?").all(email);
    expect(JSON.stringify(rows)).not.toContain(secret);
  });

  test("accepted, makes the account, gives the role by the new member's own event, and signs in", async () => {
    const secret = await invited("lead");
    const client = server.client();
    const reply = await accept(secret, undefined, client);
    expect(reply.json).toMatchObject({
      surveyId: team.surveyId,
      session: { account: { name: "Nia Brandt", email, isOwner: false } },
    });
    expect((await client.call(readSurvey, { params: here() })).json.roles).toEqual(["lead"]);
    const last = allEvents(server.platform.db, team.surveyId).at(-1);
    const payload = JSON.parse(last?.payload ?? "{}") as { member: string };
    expect(last).toMatchObject({ kind: "member-added", memberId: payload.member });
    expect(payload).toMatchObject({ name: "Nia Brandt", role: "lead" });
    expect((await list()).invitations).toEqual([]);
    // Its link is used up: the mail holds it no more.
    expect(mailTo(server, email).text).not.toContain(secret);
  });

  test("works once", async () => {
    const secret = await invited();
    await accept(secret);
    expect((await read(secret)).status).toBe(410);
    expect((await accept(secret)).json.code).toBe("link-ended");
  });

  test("clicked twice at the same moment it is accepted once, with one account and one event", async () => {
    const secret = await invited();
    const before = allEvents(server.platform.db, team.surveyId).length;
    const replies = await Promise.all([accept(secret), accept(secret)]);
    expect(replies.map((reply) => reply.status).toSorted((a, b) => a - b)).toEqual([200, 410]);
    expect(allEvents(server.platform.db, team.surveyId)).toHaveLength(before + 1);
  });

  test("needs a name, and a password by the rules, and stays open until it has them", async () => {
    const secret = await invited();
    const nameless = await server.client().call(acceptInvitation, { params: { secret }, body: { password: PASSWORD } });
    expect(nameless.json.code).toBe("input-invalid");
    expect((await accept(secret, { name: "Nia", password: "too short" })).json.code).toBe("password-too-short");
    expect((await accept(secret, { name: "Nia", password: "Password2031" })).json.code).toBe("password-common");
    expect((await accept(secret)).status).toBe(200);
  });

  test("has expired after 14 days, to the millisecond, and can be renewed with a new link", async () => {
    const secret = await invited();
    server.setNow("2031-05-16T07:59:59.999Z");
    expect((await read(secret)).status).toBe(200);
    server.setNow("2031-05-16T08:00:00.000Z");
    expect((await read(secret)).json.code).toBe("link-ended");
    expect((await accept(secret)).json.code).toBe("link-ended");
    const planner = await server.signedIn("planner@example.org");
    const [open] = (await planner.call(listPeople, { params: here() })).json.invitations;
    expect(open).toMatchObject({ email, expired: true });
    await planner.call(renewInvitation, { params: { ...here(), invitationId: open?.id ?? "" } });
    const renewed = secretTo(server, email, "invitation");
    expect(renewed).not.toBe(secret);
    expect((await read(secret)).json.code).toBe("link-ended");
    expect((await read(renewed)).json.expiresAt).toBe("2031-05-30T08:00:00.000Z");
    people = { ...people, planner: await server.signedIn("planner@example.org") };
  });

  test("that is withdrawn ends its link and its mail, and can't be renewed", async () => {
    const secret = await invited();
    const invitationId = (await list()).invitations[0]?.id ?? "";
    const params = { ...here(), invitationId };
    const reply = await team.planner.call(withdrawInvitation, { params });
    expect(reply.json.invitations).toEqual([]);
    expect((await accept(secret)).json.code).toBe("link-ended");
    expect(mailTo(server, email).text).not.toContain(secret);
    expect((await team.planner.call(renewInvitation, { params })).json.code).toBe("not-found");
  });

  test("for the same address and role is sent once while it is open; after it expired adding again renews it", async () => {
    await invited();
    expect((await add()).json.code).toBe("invitation-exists");
    expect(mailsTo(server, email)).toHaveLength(1);
    expect((await add("auditor")).json.invitations).toHaveLength(2);
    server.setNow("2031-05-16T08:00:00.000Z");
    const planner = await server.signedIn("planner@example.org");
    const reply = await planner.call(addPerson, { params: here(), body: { email, role: "counter" } });
    expect(reply.json.invitations.map(({ role, expired }) => [role, expired])).toContainEqual(["counter", false]);
    expect(reply.json.invitations).toHaveLength(2);
    people = { ...people, planner };
  });

  test("of another survey can neither be renewed nor withdrawn from here", async () => {
    await invited();
    const invitationId = (await list()).invitations[0]?.id ?? "";
    const other = await anotherSurvey(people);
    const params = { surveyId: other.surveyId, invitationId };
    expect((await other.planner.call(renewInvitation, { params })).json.code).toBe("not-found");
    expect((await other.planner.call(withdrawInvitation, { params })).json.code).toBe("not-found");
  });
});

describe("an invitation to an address that has an account by now", () => {
  test("asks for the account's password and for no name", async () => {
    const first = await invited("counter");
    await add("auditor");
    const second = secretTo(server, email, "invitation", "auditor");
    await accept(first);
    expect((await read(second)).json.hasAccount).toBe(true);
    const wrong = await accept(second, { name: "Somebody Else", password: "another long sentence" });
    expect(wrong.json.code).toBe("sign-in-refused");
    const reply = await accept(second, { name: "Somebody Else", password: PASSWORD });
    expect(reply.json.session.account?.name).toBe("Nia Brandt");
    const client = server.client();
    await client.call(signIn, { body: { email, password: PASSWORD } });
    const { roles } = (await client.call(readSurvey, { params: here() })).json;
    expect(roles.toSorted()).toEqual(["auditor", "counter"]);
  });

  test("ends when the role is given at once instead", async () => {
    const secret = await invited("lead");
    await server.person(email);
    expect((await add("lead")).status).toBe(200);
    expect((await list()).invitations).toEqual([]);
    expect((await accept(secret)).json.code).toBe("link-ended");
  });
});

// Invited in two roles before there was an account; one link was used, and the other is still in a mailbox.
describe("an old link", () => {
  const setTo = async (roles: Role[]) => {
    const member = (await list()).members.find((one) => one.email === email);
    const params = { ...here(), memberId: member?.id ?? "" };
    expect((await team.planner.call(setRoles, { params, body: { roles } })).status).toBe(200);
  };

  test("does not bring back somebody who was removed from the survey", async () => {
    const lead = await invited("lead");
    expect((await accept(await invited("counter"))).status).toBe(200);
    await setTo([]);
    expect((await list()).invitations).toEqual([]);
    expect((await accept(lead)).json.code).toBe("link-ended");
  });

  test("does not give back a role that was given and ended since; one for another role still works", async () => {
    const lead = await invited("lead");
    const auditor = await invited("auditor");
    expect((await accept(await invited("counter"))).status).toBe(200);
    await setTo(["counter", "lead"]);
    await setTo(["counter"]);
    expect((await accept(lead)).json.code).toBe("link-ended");
    expect((await accept(auditor)).status).toBe(200);
  });

  test("does not make somebody an owner after an owner decided about their account", async () => {
    await team.owner.call(inviteAccount, { body: { email, makesOwner: true } });
    const secret = secretTo(server, email, "invitation", "owners");
    const made = await accept(await invited());
    const params = { accountId: made.json.session.account?.id ?? "" };
    for (const isOwner of [true, false]) {
      expect((await team.owner.call(changeAccount, { params, body: { isOwner, closed: false } })).status).toBe(200);
    }
    expect((await accept(secret)).json.code).toBe("link-ended");
  });
});

describe("an invitation to the installation", () => {
  const invite = (makesOwner: boolean) => team.owner.call(inviteAccount, { body: { email, makesOwner } });
  const open = async () =>
    (await (await server.signedIn("owner@example.org")).call(listAccounts)).json.invitations.find(
      (one) => one.email === email,
    );

  test("makes an owner where it says so, and no member of a survey", async () => {
    const { invitations } = (await invite(true)).json;
    expect(invitations.find((one) => one.email === email)).toMatchObject({ survey: null, makesOwner: true });
    const secret = secretTo(server, email, "invitation");
    expect(mailTo(server, email).text).toContain("as one of its owners");
    const client = server.client();
    const reply = await accept(secret, undefined, client);
    expect(reply.json).toMatchObject({ surveyId: null, session: { account: { isOwner: true } } });
    expect((await client.call(listAccounts)).status).toBe(200);
  });

  test("done again it replaces the one before, and what that would have made of somebody", async () => {
    await invite(true);
    const first = secretTo(server, email, "invitation");
    await invite(false);
    expect((await accept(first)).json.code).toBe("link-ended");
    expect(await open()).toMatchObject({ makesOwner: false });
    const reply = await accept(secretTo(server, email, "invitation"));
    expect(reply.json.session.account?.isOwner).toBe(false);
  });

  test("can be withdrawn", async () => {
    await invite(true);
    const secret = secretTo(server, email, "invitation");
    const params = { invitationId: (await open())?.id ?? "" };
    expect((await team.owner.call(withdrawAccountInvitation, { params })).status).toBe(200);
    expect(await open()).toBeUndefined();
    expect((await accept(secret)).json.code).toBe("link-ended");
  });
});

test("accepting while somebody else is signed in in the same browser ends that session", async () => {
  const client = await server.person(`before-${count}@example.org`);
  const copy = await server.signedIn(`before-${count}@example.org`);
  const secret = await invited();
  await accept(secret, undefined, client);
  expect((await client.call(readSession)).json.account?.email).toBe(email);
  // The other browser of that person stays.
  expect((await copy.call(readSession)).json.account?.email).toBe(`before-${count}@example.org`);
});

test("after a hundred in a day the next waits for the day to pass, whichever survey it is for", async () => {
  server.setNow("2031-05-10T08:00:00.000Z");
  let sent = 0; // other tests wrote some of the hundred
  while (sent < 200 && (await add("counter", `many-${sent}@example.org`)).status === 200) sent += 1;
  expect(sent).toBeGreaterThan(50);
  expect(sent).toBeLessThanOrEqual(100);
  team = await anotherSurvey(people);
  const refused = await add("counter", "one-more@example.org");
  expect(refused).toMatchObject({ status: 429, json: { code: "too-many-requests" } });
  expect(mailsTo(server, "one-more@example.org")).toEqual([]);
  server.setNow("2031-05-11T08:00:00.001Z");
  expect((await add("counter", "one-more@example.org")).status).toBe(200);
}, 60_000);
