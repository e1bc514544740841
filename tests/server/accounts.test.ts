import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { readSession, signIn, signOut } from "#shared/api/accounts.ts";
import { addPerson, listPeople } from "#shared/api/people.ts";
import { createSurvey, listOtherSurveys, listSurveys, readSurvey } from "#shared/api/surveys.ts";
import { startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";

let server: TestServer;
let team: Team;

beforeAll(async () => {
  server = await startTestServer();
  team = await startTeam(server);
}, 60_000);

afterAll(() => server.stop());

describe("signing in", () => {
  test("an unknown address and a wrong password get the same refusal", async () => {
    const client = server.client();
    const unknown = await client.call(signIn, { body: { email: "nobody@example.org", password: "whatever it is" } });
    const wrong = await client.call(signIn, { body: { email: "planner@example.org", password: "whatever it is" } });
    expect(unknown.status).toBe(401);
    expect(unknown.json).toEqual(wrong.json);
    expect(unknown.json.code).toBe("sign-in-refused");
  });

  test("signing out ends the session for a copied cookie too", async () => {
    const client = await server.person("leaver@example.org");
    const before = await client.call(readSession);
    expect(before.json.account?.email).toBe("leaver@example.org");
    await client.call(signOut);
    expect((await client.call(readSession)).json.account).toBeNull();
    expect((await client.call(listSurveys)).json.code).toBe("not-signed-in");
  });

  test("a write that a browser sends from another site is refused", async () => {
    const response = await team.planner.fetch("/api/session", {
      method: "DELETE",
      headers: { origin: "https://elsewhere.example" },
    });
    expect(response.status).toBe(403);
    expect(((await response.json()) as { code: string }).code).toBe("cross-origin");
  });
});

describe("people of a survey", () => {
  test("a person may hold two roles and stands in the list once", async () => {
    const params = { surveyId: team.surveyId };
    await team.planner.call(addPerson, { params, body: { email: "lead@example.org", role: "counter" } });
    const { json } = await team.planner.call(listPeople, { params });
    const lead = json.members.filter((member) => member.email === "lead@example.org");
    expect(lead).toHaveLength(1);
    expect(lead[0]?.roles.toSorted()).toEqual(["counter", "lead"]);
  });

  test("an owner without a role may add themself, and sees the survey only after that", async () => {
    const params = { surveyId: team.surveyId };
    expect((await team.owner.call(readSurvey, { params })).status).toBe(404);
    const added = await team.owner.call(addPerson, { params, body: { email: "owner@example.org", role: "auditor" } });
    expect(added.status).toBe(200);
    expect((await team.owner.call(readSurvey, { params })).json.roles).toEqual(["auditor"]);
  });
});

test("an owner is told of the surveys in which they hold no role, by name only; a role takes one off that list", async () => {
  const owner = await server.person("finder@example.org", { isOwner: true });
  const others = async () => (await owner.call(listOtherSurveys)).json.surveys;
  const created = await team.planner.call(createSurvey, {
    body: {
      ...{
        name: "Dunmarrow Links",
        targetSingular: "nest",
        targetPlural: "nests",
        countingRule: "",
        wholeNumbers: true,
      },
      ...{ seasonName: "2031", timeZone: "Europe/London", safetyNotes: "" },
    },
  });
  const { id, name, createdAt } = created.json;
  expect((await others()).map((survey) => survey.name).toSorted()).toEqual(["Dunmarrow Links", "Hallow Moss"]);
  expect(await others()).toContainEqual({ id, name, createdAt });
  // Adding somebody else gives the owner an id in the record and no role: the survey stays on the list.
  const add = (email: string) =>
    owner.call(addPerson, { params: { surveyId: id }, body: { email, role: "auditor" as const } });
  expect((await add("stranger@example.org")).status).toBe(200);
  expect(await others()).toHaveLength(2);
  expect((await add("finder@example.org")).status).toBe(200);
  expect((await others()).map((survey) => survey.name)).toEqual(["Hallow Moss"]);
  expect((await team.planner.call(listOtherSurveys)).json.code).toBe("not-allowed");
});
