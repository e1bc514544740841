import type { Express } from "express";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { ownerMay, reach, type Role, ROLES } from "#shared/access/table.ts";
import { ALL_CONTRACTS } from "#shared/api/all.ts";
import type { Contract } from "#shared/api/contract.ts";
import { changeAccount, listAccounts } from "#shared/api/installation.ts";
import { acceptInvitation, addPerson, listPeople, readInvitation, setRoles } from "#shared/api/people.ts";
import { secretTo } from "../fixtures/mails.ts";
import { anotherSurvey } from "../fixtures/sealed-frame.ts";
import { type Client, PASSWORD, startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";

// Generated from the contracts: every route × every role, nobody, an owner with and without a role, somebody signed in without
// a role here, the same role on another survey, and those who had a role once. A call that passes the guard may still be
// refused for what it lacks (no file, no such id): what is tested is that the guard, and nothing before it, decides.
const GUARD_CODES = new Set(["not-signed-in", "not-allowed", "survey-not-found"]);

/** Those who are or were here, beside the team. */
interface Others {
  /** Of the installation, and auditor of the survey. */
  readonly auditingOwner: Client;
  /** Was its lead, was removed, and has signed in again. */
  readonly removed: Client;
  /** Was lead and auditor; is auditor. */
  readonly halfEnded: Client;
  /** Is signed in to another account, and holds a link to be its planner that has expired. */
  readonly expired: Client;
  /** Was its planner until the account was closed; the cookie is still there. */
  readonly closed: Client;
}

let server: TestServer;
let here: Team;
let elsewhere: Team;
let others: Others;
let expiredLink: string;

beforeAll(async () => {
  server = await startTestServer();
  here = await startTeam(server);
  elsewhere = await startTeam(server, "other-");
  others = await startOthers();
}, 60_000);

afterAll(() => server.stop());

async function startOthers(): Promise<Others> {
  await server.person("auditing-owner@example.org", { isOwner: true });
  for (const name of ["removed", "half-ended", "expired", "closed"]) await server.person(`${name}@example.org`);
  const signedIn = (name: string) => server.signedIn(`${name}@example.org`);
  await give("auditing-owner", "auditor");
  await give("removed", "lead");
  await give("half-ended", "lead");
  await give("closed", "planner");
  await set("removed", []);
  await set("half-ended", ["auditor"]);
  await give("newcomer", "planner");
  expiredLink = secretTo(server, "newcomer@example.org", "invitation");
  // The links work for 14 days, as sessions do; everybody signs in again three days after.
  server.setNow("2031-05-19T08:00:00.000Z");
  here = await signInAgain(here, "");
  elsewhere = await signInAgain(elsewhere, "other-");
  const closed = await signedIn("closed");
  const { accounts } = (await here.owner.call(listAccounts)).json;
  const accountId = accounts.find(({ email }) => email === "closed@example.org")?.id ?? "";
  await here.owner.call(changeAccount, { params: { accountId }, body: { isOwner: false, closed: true } });
  return {
    auditingOwner: await signedIn("auditing-owner"),
    removed: await signedIn("removed"),
    halfEnded: await signedIn("half-ended"),
    expired: await signedIn("expired"),
    closed,
  };
}

const give = (name: string, role: Role) =>
  here.planner.call(addPerson, { params: { surveyId: here.surveyId }, body: { email: `${name}@example.org`, role } });

async function set(name: string, roles: Role[]): Promise<void> {
  const { surveyId } = here;
  const { members } = (await here.planner.call(listPeople, { params: { surveyId } })).json;
  const memberId = members.find(({ email }) => email === `${name}@example.org`)?.id ?? "";
  const reply = await here.planner.call(setRoles, { params: { surveyId, memberId }, body: { roles } });
  if (reply.status !== 200) throw new Error(reply.json.detail);
}

async function signInAgain({ surveyId }: Team, prefix: string): Promise<Team> {
  const one = (name: string) => server.signedIn(`${prefix}${name}@example.org`);
  return {
    surveyId,
    owner: await one("owner"),
    planner: await one("planner"),
    lead: await one("lead"),
    counter: await one("counter"),
    auditor: await one("auditor"),
    stranger: await one("stranger"),
  };
}

const surveyContracts = ALL_CONTRACTS.filter((contract) => contract.path.startsWith("/api/surveys/:surveyId"));
const otherContracts = ALL_CONTRACTS.filter((contract) => !surveyContracts.includes(contract));

/** What takes a role, a session or the survey itself away from whoever may do it: done to a survey of its own. */
const UNDOING = new Set(["leaveSurvey", "deleteSurvey", "archiveSurvey", "unarchiveSurvey"]);
/** What ends the session that the next test needs. */
const ENDS_SESSIONS = new Set(["signOut", "endOtherSessions"]);

async function codeOf(client: Client, contract: Contract, surveyId: string): Promise<string> {
  const params = { surveyId, name: "quillet-frame-1", epsg: "32632", handle: "0".repeat(64), secret: "x".repeat(43) };
  const { status, json } = await client.call(contract, { params });
  return status < 400 ? "passed" : (json.code ?? `status ${status}`);
}

/** The survey on which a contract may be tried by the team: this one, or one of its own with the same people. */
async function placeFor(contract: Contract): Promise<string> {
  return UNDOING.has(contract.name) ? (await anotherSurvey(here)).surveyId : here.surveyId;
}

describe("every route of a survey", () => {
  for (const contract of surveyContracts) {
    const action = contract.guard;
    if (action === "public" || action === "signed-in" || action === "owner") {
      test(`${contract.name} is guarded by an action of the table`, () => expect.unreachable());
      continue;
    }

    test(`${contract.name}: nobody, a stranger and the same roles elsewhere are refused`, async () => {
      expect(await codeOf(server.client(), contract, here.surveyId)).toBe("not-signed-in");
      expect(await codeOf(here.stranger, contract, here.surveyId)).toBe("survey-not-found");
      for (const role of ROLES) {
        expect(await codeOf(elsewhere[role], contract, here.surveyId), role).toBe("survey-not-found");
      }
    });

    test(`${contract.name}: who was removed, is only invited, or has a closed account is refused`, async () => {
      expect(await codeOf(others.removed, contract, here.surveyId), "removed").toBe("survey-not-found");
      expect(await codeOf(others.expired, contract, here.surveyId), "expired").toBe("survey-not-found");
      expect(await codeOf(others.closed, contract, here.surveyId), "closed").toBe("not-signed-in");
    });

    test(`${contract.name}: the roles of the survey get what the table says`, async () => {
      for (const role of ROLES) {
        const code = await codeOf(here[role], contract, await placeFor(contract));
        if (reach([role], action) === "none") expect(code, role).toBe("not-allowed");
        else expect(GUARD_CODES.has(code), `${role}: ${code}`).toBe(false);
      }
    });

    test(`${contract.name}: a role that ended gives nothing, whatever else is held`, async () => {
      if (UNDOING.has(contract.name) && reach(["auditor"], action) !== "none") return; // the team's auditor did it above
      const code = await codeOf(others.halfEnded, contract, here.surveyId);
      expect(code === "not-allowed", code).toBe(reach(["auditor"], action) === "none");
      expect(code).not.toBe("survey-not-found");
    });

    test(`${contract.name}: an owner without a role gets ${ownerMay(action) ? "in" : "nothing"}`, async () => {
      const code = await codeOf(here.owner, contract, here.surveyId);
      expect(code === "survey-not-found").toBe(!ownerMay(action));
    });

    test(`${contract.name}: an owner who is auditor gets what an auditor gets, and people`, async () => {
      if (UNDOING.has(contract.name) && reach(["auditor"], action) !== "none") return;
      const code = await codeOf(others.auditingOwner, contract, here.surveyId);
      expect(code === "not-allowed", code).toBe(reach(["auditor"], action) === "none" && !ownerMay(action));
      expect(code).not.toBe("survey-not-found");
    });
  }
});

describe("every other route", () => {
  for (const contract of otherContracts.filter(({ name }) => !ENDS_SESSIONS.has(name))) {
    test(`${contract.name}: ${contract.guard}`, async () => {
      const nobody = await codeOf(server.client(), contract, "none");
      expect(nobody === "not-signed-in").toBe(contract.guard !== "public");
      const closed = await codeOf(others.closed, contract, "none");
      expect(closed === "not-signed-in").toBe(contract.guard !== "public");
      const plain = await codeOf(here.stranger, contract, "none");
      expect(plain === "not-allowed").toBe(contract.guard === "owner");
      for (const owner of [here.owner, others.auditingOwner]) {
        expect(GUARD_CODES.has(await codeOf(owner, contract, "none"))).toBe(false);
      }
    });
  }

  test("what ends sessions asks for one", async () => {
    const ending = otherContracts.filter(({ name }) => ENDS_SESSIONS.has(name));
    expect(ending).toHaveLength(ENDS_SESSIONS.size);
    for (const contract of ending) expect(await codeOf(server.client(), contract, "none")).toBe("not-signed-in");
  });
});

test("after all that the team is as it was: nothing in this table undid itself", async () => {
  const { members } = (await here.planner.call(listPeople, { params: { surveyId: here.surveyId } })).json;
  const roles = Object.fromEntries(members.map((member) => [member.email, member.roles]));
  for (const role of ROLES) expect(roles[`${role}@example.org`]).toEqual([role]);
  expect(roles["half-ended@example.org"]).toEqual(["auditor"]);
  expect(roles["auditing-owner@example.org"]).toEqual(["auditor"]);
});

test("a link that has expired lets nobody in, neither a newcomer nor somebody signed in", async () => {
  const params = { secret: expiredLink };
  for (const client of [server.client(), others.expired]) {
    expect((await client.call(readInvitation, { params })).json.code).toBe("link-ended");
    const reply = await client.call(acceptInvitation, { params, body: { name: "New", password: PASSWORD } });
    expect(reply.json.code).toBe("link-ended");
  }
});

test("ids of another survey are not found, whatever the role", async () => {
  for (const contract of surveyContracts.filter((each) => (each.path.match(/:/g) ?? []).length > 1)) {
    const code = await codeOf(here.planner, contract, here.surveyId);
    if (contract.guard !== "counts.enter") expect(["not-found", "not-allowed"], contract.name).toContain(code);
  }
});

test("no route of the server came from anywhere but a contract", () => {
  const mounted = routesOf(server.app).toSorted();
  const described = ALL_CONTRACTS.map((contract) => `${contract.method} ${contract.path}`).toSorted();
  // The limiters of what anybody may call stand on the paths of contracts.
  expect([...new Set(mounted)]).toEqual(described);
});

interface Layer {
  readonly route?: { readonly path: string; readonly methods: Record<string, boolean> };
  readonly handle?: { readonly stack?: readonly Layer[] };
}

function routesOf(app: Express): string[] {
  const walk = (stack: readonly Layer[]): string[] =>
    stack.flatMap((layer) => {
      if (layer.route) {
        const { path, methods } = layer.route;
        return Object.keys(methods).map((method) => `${method.toUpperCase()} ${path}`);
      }
      return layer.handle?.stack ? walk(layer.handle.stack) : [];
    });
  return walk((app.router as unknown as { stack: readonly Layer[] }).stack);
}
