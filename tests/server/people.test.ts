import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import type { Role } from "#shared/access/table.ts";
import { readSession } from "#shared/api/accounts.ts";
import { changeAccount, inviteAccount, listAccounts } from "#shared/api/installation.ts";
import { addPerson, changeName, leaveSurvey, listPeople, setRoles } from "#shared/api/people.ts";
import { readRecordFile } from "#shared/api/record.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import { replay } from "#shared/record/replay.ts";
import { keyFingerprint, publicKeyOf } from "#shared/record/sign.ts";
import { findAccountByEmail } from "#server/db/accounts.ts";
import { allEvents } from "#server/db/events.ts";
import { changeName as changeNameOf } from "#server/services/change-name.ts";
import { mailsTo, mailTo } from "../fixtures/mails.ts";
import { anotherSurvey } from "../fixtures/sealed-frame.ts";
import { type Client, startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";

let server: TestServer;
let people: Team;
let team: Team;
const here = () => ({ surveyId: team.surveyId });

beforeAll(async () => {
  server = await startTestServer();
  people = await startTeam(server);
}, 60_000);
beforeEach(async () => {
  team = await anotherSurvey(people);
});
afterAll(() => server.stop());

const listed = async (client: Client = team.planner) =>
  (await client.call(listPeople, { params: here() })).json.members;
async function idOf(email: string): Promise<string> {
  const found = (await listed()).find((member) => member.email === email);
  if (!found) throw new Error(`${email} is not in the list`);
  return found.id;
}
const set = async (email: string, roles: Role[], as: Client = team.planner) =>
  as.call(setRoles, { params: { ...here(), memberId: await idOf(email) }, body: { roles } });
const acts = () =>
  allEvents(server.platform.db, team.surveyId).map((event) => ({
    kind: event.kind,
    actor: event.memberId,
    ...(JSON.parse(event.payload) as { member?: string; role?: string }),
  }));

describe("giving a role", () => {
  test("an address that has an account is given it at once, and a mail tells survey, role and by whom", async () => {
    const reply = await team.planner.call(addPerson, {
      params: here(),
      body: { email: "Stranger@Example.org", role: "counter" },
    });
    expect(reply.json.members.find((member) => member.email === "stranger@example.org")?.roles).toEqual(["counter"]);
    expect(reply.json.invitations).toEqual([]);
    expect((await team.stranger.call(readSurvey, { params: here() })).json.roles).toEqual(["counter"]);
    const mail = mailTo(server, "stranger@example.org");
    expect(mail).toMatchObject({ kind: "added", secret: false, state: "kept", surveyId: team.surveyId });
    expect(mail.text).toContain("Planner made you counter of the survey “Hallow Moss”");
    expect(mail.text).toContain(`${server.url}/surveys/${team.surveyId}`);
    expect(mail.text).not.toContain("fingerprint");
  });

  test("an auditor's mail holds the fingerprint of the signing key", async () => {
    await team.planner.call(addPerson, { params: here(), body: { email: "stranger@example.org", role: "auditor" } });
    const fingerprint = keyFingerprint(publicKeyOf(server.platform.signingKey));
    expect(mailTo(server, "stranger@example.org").text).toContain(fingerprint);
  });

  test("a role that is held already is refused; nobody is written to", async () => {
    const before = mailsTo(server, "lead@example.org").length;
    const again = await team.planner.call(addPerson, {
      params: here(),
      body: { email: "lead@example.org", role: "lead" },
    });
    expect(again.json.code).toBe("member-exists");
    expect(mailsTo(server, "lead@example.org")).toHaveLength(before);
  });

  test("who asks is marked in the list", async () => {
    const own = (await listed(team.lead)).filter((member) => member.isSelf).map((member) => member.email);
    expect(own).toEqual(["lead@example.org"]);
  });
});

describe("changing roles", () => {
  test("each role that ends and each that begins is an event by whoever did it", async () => {
    const [lead, planner] = [await idOf("lead@example.org"), await idOf("planner@example.org")];
    await set("lead@example.org", ["counter", "auditor"]);
    expect(acts().slice(-3)).toMatchObject([
      { kind: "member-added", actor: planner, member: lead, role: "counter" },
      { kind: "member-added", actor: planner, member: lead, role: "auditor" },
      { kind: "role-ended", actor: planner, member: lead, role: "lead" },
    ]);
    expect((await listed()).find((member) => member.id === lead)?.roles.toSorted()).toEqual(["auditor", "counter"]);
    expect(mailTo(server, "lead@example.org").subject).toBe("Hallow Moss: you are no longer its lead");
  });

  test("the same roles again change nothing", async () => {
    const before = acts().length;
    expect((await set("lead@example.org", ["lead"])).status).toBe(200);
    expect(acts()).toHaveLength(before);
  });

  test("whoever was removed can be given a role again, and keeps the id under which the record names them", async () => {
    const before = await idOf("counter@example.org");
    await set("counter@example.org", []);
    expect((await listed()).map((member) => member.email)).not.toContain("counter@example.org");
    await team.planner.call(addPerson, { params: here(), body: { email: "counter@example.org", role: "counter" } });
    expect(await idOf("counter@example.org")).toBe(before);
    people = { ...people, counter: await again("counter@example.org") };
  });

  test("the last planner can neither leave nor lose the role; with another they can", async () => {
    expect((await team.planner.call(leaveSurvey, { params: here() })).json.code).toBe("last-planner");
    expect((await set("planner@example.org", ["auditor"])).json.code).toBe("last-planner");
    expect((await set("planner@example.org", [], await again("owner@example.org"))).json.code).toBe("last-planner");
    await set("lead@example.org", ["lead", "planner"]);
    expect((await team.planner.call(leaveSurvey, { params: here() })).status).toBe(200);
    expect((await team.planner.call(readSurvey, { params: here() })).json.code).toBe("survey-not-found");
    // Leaving is one's own act: the session stays, and the record says who left.
    expect((await team.planner.call(readSession)).json.account?.email).toBe("planner@example.org");
    const [left] = acts().slice(-1);
    expect(left).toMatchObject({ kind: "role-ended", role: "planner" });
    expect(left?.actor).toBe(left?.member);
  });

  test("a planner whose account is closed does not count as one who is left", async () => {
    await server.person("second@example.org");
    await team.planner.call(addPerson, { params: here(), body: { email: "second@example.org", role: "planner" } });
    const { accounts } = (await team.owner.call(listAccounts)).json;
    const accountId = accounts.find((account) => account.email === "second@example.org")?.id ?? "";
    await team.owner.call(changeAccount, { params: { accountId }, body: { isOwner: false, closed: true } });
    expect((await team.planner.call(leaveSurvey, { params: here() })).json.code).toBe("last-planner");
    const closed = await team.planner.call(addPerson, {
      params: here(),
      body: { email: "second@example.org", role: "lead" },
    });
    expect(closed.json.code).toBe("account-closed");
  });

  test("two planners who remove each other at the same moment: one of them stays", async () => {
    await set("lead@example.org", ["planner"]);
    const replies = await Promise.all([
      set("lead@example.org", [], team.planner),
      set("planner@example.org", [], team.lead),
    ]);
    expect(replies.map((reply) => reply.status).toSorted((a, b) => a - b)[0]).toBe(200);
    expect(replies.filter((reply) => reply.status === 200)).toHaveLength(1);
    people = { ...people, planner: await again("planner@example.org"), lead: await again("lead@example.org") };
  });

  test("an owner without a role who changes roles is named in the record by an id without a role", async () => {
    const owner = await again("owner@example.org");
    expect((await set("lead@example.org", [], owner)).status).toBe(200);
    const [ended] = acts().slice(-1);
    expect(ended?.kind).toBe("role-ended");
    expect((await listed()).map((member) => member.id)).not.toContain(ended?.actor);
    people = { ...people, lead: await again("lead@example.org") };
  });

  // The guard is asked at each request and the session's row is gone: the very next request of an open tab is refused.
  test("removal by somebody else ends an open session within one request", async () => {
    expect((await team.counter.call(readSurvey, { params: here() })).status).toBe(200);
    await set("counter@example.org", []);
    expect((await team.counter.call(readSurvey, { params: here() })).json.code).toBe("not-signed-in");
    expect((await team.counter.call(readSession)).json.account).toBeNull();
    people = { ...people, counter: await again("counter@example.org") };
    expect((await people.counter.call(readSurvey, { params: here() })).json.code).toBe("survey-not-found");
  });

  test("who loses one role of two stays signed in with the other", async () => {
    await set("lead@example.org", ["lead", "auditor"]);
    await set("lead@example.org", ["auditor"]);
    expect((await team.lead.call(readSurvey, { params: here() })).json.roles).toEqual(["auditor"]);
  });
});

describe("a new name", () => {
  test("is told in the record of each survey of the person, also of one that they left", async () => {
    const mover = await server.person("mover@example.org");
    const other = await anotherSurvey(people);
    for (const surveyId of [team.surveyId, other.surveyId]) {
      await team.planner.call(addPerson, {
        params: { surveyId },
        body: { email: "mover@example.org", role: "auditor" },
      });
    }
    await mover.call(leaveSurvey, { params: { surveyId: other.surveyId } });
    expect((await mover.call(changeName, { body: { name: "  Ada Mover " } })).json.name).toBe("Ada Mover");
    for (const surveyId of [team.surveyId, other.surveyId]) {
      const last = allEvents(server.platform.db, surveyId).at(-1);
      expect(last?.kind).toBe("member-renamed");
      expect(JSON.parse(last?.payload ?? "{}")).toMatchObject({ before: "Mover", after: "Ada Mover" });
    }
    expect((await mover.call(readSession)).json.account?.name).toBe("Ada Mover");
  });

  // Both requests were let in while the name was "Counter": the second one's event must begin with what the first one set.
  test("changed twice at the same moment is told as one name after the other", () => {
    const { platform } = server;
    const account = findAccountByEmail(platform.db, "counter@example.org");
    if (!account) throw new Error("nobody is counter");
    changeNameOf({ ...platform, account }, "Counter B");
    changeNameOf({ ...platform, account }, "Counter C");
    const events = allEvents(platform.db, team.surveyId).filter(({ kind }) => kind === "member-renamed");
    const names = events.slice(-2).map(({ payload }) => JSON.parse(payload) as { before: string; after: string });
    expect(names.map(({ before, after }) => [before, after])).toEqual([
      [account.name, "Counter B"],
      ["Counter B", "Counter C"],
    ]);
    changeNameOf({ ...platform, account }, account.name);
    expect(findAccountByEmail(platform.db, "counter@example.org")?.name).toBe(account.name);
  });

  test("that is the old one is no event", async () => {
    const before = acts().length;
    await team.lead.call(changeName, { body: { name: "Lead" } });
    expect(acts()).toHaveLength(before);
  });
});

describe("accounts of the installation", () => {
  test("the owner sees each account with its surveys and when it was last there", async () => {
    const { accounts } = (await team.owner.call(listAccounts)).json;
    const own = accounts.find((account) => account.isSelf);
    expect(own).toMatchObject({ email: "owner@example.org", isOwner: true, surveys: 0, closedAt: null });
    expect(own?.lastSeenAt).toBe("2031-05-02T08:00:00.000Z");
    expect(accounts.find((account) => account.email === "planner@example.org")?.surveys).toBeGreaterThan(1);
  });

  test("a closed account's sessions end and it can't sign in; opened again it can", async () => {
    const leaver = await server.person("closing@example.org");
    const accountId = await accountOf("closing@example.org");
    const change = (closed: boolean) =>
      team.owner.call(changeAccount, { params: { accountId }, body: { isOwner: false, closed } });
    const { accounts } = (await change(true)).json;
    expect(accounts.find((account) => account.id === accountId)?.closedAt).toBe("2031-05-02T08:00:00.000Z");
    expect((await leaver.call(readSession)).json.account).toBeNull();
    await expect(again("closing@example.org")).rejects.toThrow("Check both and try again");
    await change(false);
    expect((await (await again("closing@example.org")).call(readSession)).json.account).not.toBeNull();
  });

  test("what was decided of roles or an account that are otherwise by now is refused", async () => {
    await server.person("twice@example.org");
    await team.planner.call(addPerson, { params: here(), body: { email: "twice@example.org", role: "counter" } });
    const params = { ...here(), memberId: await idOf("twice@example.org") };
    const decide = (roles: Role[], seen: Role[]) => team.planner.call(setRoles, { params, body: { roles, seen } });
    expect((await decide([], ["counter"])).status).toBe(200);
    // Another planner still has the list of before, and would bring them back.
    const stale = await decide(["counter", "auditor"], ["counter"]);
    expect(stale).toMatchObject({ status: 412, json: { code: "changed-meanwhile" } });
    expect(stale.json.detail).toContain("no longer in the survey by now");
    const accountId = await accountOf("twice@example.org");
    const body = { isOwner: true, closed: false, seen: { isOwner: false, closed: true } };
    const changed = await team.owner.call(changeAccount, { params: { accountId }, body });
    expect(changed.json.code).toBe("changed-meanwhile");
  });

  test("the last owner who can sign in stays owner, and open", async () => {
    await server.person("spare@example.org", { isOwner: true });
    const [own, spare] = [await accountOf("owner@example.org"), await accountOf("spare@example.org")];
    const change = (accountId: string, isOwner: boolean, closed: boolean) =>
      team.owner.call(changeAccount, { params: { accountId }, body: { isOwner, closed } });
    expect((await change(spare, true, true)).status).toBe(200);
    expect((await change(own, false, false)).json.code).toBe("last-owner");
    expect((await change(own, true, true)).json.code).toBe("last-owner");
    expect((await team.owner.call(listAccounts)).status).toBe(200);
    await change(spare, true, false);
    await change(spare, false, false);
  });

  test("an address that has an account can't be invited to the installation", async () => {
    const reply = await team.owner.call(inviteAccount, { body: { email: "lead@example.org", makesOwner: true } });
    expect(reply.json.code).toBe("account-exists");
  });
});

test("a record after roles ended and names changed holds no address, and its people replay", async () => {
  await set("lead@example.org", ["auditor"]);
  await set("counter@example.org", [], await again("owner@example.org"));
  people = { ...people, counter: await again("counter@example.org") };
  await people.counter.call(changeName, { body: { name: "Cora Counter" } });
  const reply = await team.planner.call(readRecordFile, { params: here() });
  const text = new TextDecoder().decode(reply.bytes);
  expect(text).not.toContain("@example.org");
  const record = JSON.parse(text) as RecordFile;
  expect(record.people).toContainEqual(expect.objectContaining({ name: "Cora Counter", roles: [] }));
  const { checks } = replay(record);
  expect(checks.filter((check) => check.outcome === "failed")).toEqual([]);
  expect(checks.find((check) => check.id === "survey")?.outcome).toBe("passed");
  await people.counter.call(changeName, { body: { name: "Counter" } });
});

async function accountOf(email: string): Promise<string> {
  return (await team.owner.call(listAccounts)).json.accounts.find((account) => account.email === email)?.id ?? "";
}

function again(email: string): Promise<Client> {
  return server.signedIn(email);
}
