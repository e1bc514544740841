import type { Express } from "express";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { ownerMay, reach, type Role, ROLES } from "#shared/access/table.ts";
import { ALL_CONTRACTS } from "#shared/api/all.ts";
import type { Contract } from "#shared/api/contract.ts";
import { type Client, startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";

// Generated from the contracts: every route × every role, nobody, an owner, somebody signed in without a role here, and the
// same role on another survey. A call that passes the guard may still be refused for what it lacks (no file, no such id):
// what is tested is that the guard, and nothing before it, decides.
const GUARD_CODES = new Set(["not-signed-in", "not-allowed", "survey-not-found"]);

let server: TestServer;
let here: Team;
let elsewhere: Team;

beforeAll(async () => {
  server = await startTestServer();
  here = await startTeam(server);
  elsewhere = await startTeam(server, "other-");
}, 30_000);

afterAll(() => server.stop());

const surveyContracts = ALL_CONTRACTS.filter((contract) => contract.path.startsWith("/api/surveys/:surveyId"));
const signOutLast = (contract: Contract) => contract.name !== "signOut";

async function codeOf(client: Client, contract: Contract, surveyId: string): Promise<string> {
  const params = { surveyId, name: "quillet-frame-1", epsg: "32632" };
  const { status, json } = await client.call(contract, { params: params });
  return status < 400 ? "passed" : (json.code ?? `status ${status}`);
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

    test(`${contract.name}: the roles of the survey get what the table says`, async () => {
      for (const role of ROLES) {
        const code = await codeOf(here[role], contract, here.surveyId);
        const roles: Role[] = [role];
        if (reach(roles, action) === "none") expect(code, role).toBe("not-allowed");
        else expect(GUARD_CODES.has(code), `${role}: ${code}`).toBe(false);
      }
    });

    test(`${contract.name}: an owner without a role gets ${ownerMay(action) ? "in" : "nothing"}`, async () => {
      const code = await codeOf(here.owner, contract, here.surveyId);
      expect(code === "survey-not-found").toBe(!ownerMay(action));
    });
  }
});

describe("every other route", () => {
  for (const contract of ALL_CONTRACTS.filter((each) => !surveyContracts.includes(each)).filter(signOutLast)) {
    test(`${contract.name}: ${contract.guard}`, async () => {
      const nobody = await codeOf(server.client(), contract, "none");
      expect(nobody === "not-signed-in").toBe(contract.guard !== "public");
      const plain = await codeOf(here.stranger, contract, "none");
      expect(plain === "not-allowed").toBe(contract.guard === "owner");
    });
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
  // The one limiter in front of signing in stands on the path of a contract.
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
