import { afterAll, beforeAll, expect, test } from "vitest";
import { keepEstimate, readEstimate } from "#shared/api/estimate.ts";
import { addPerson, changeName, leaveSurvey, listPeople, setRoles } from "#shared/api/people.ts";
import { archiveSurvey, changeSettings, readSettings, unarchiveSurvey } from "#shared/api/settings.ts";
import { replay } from "#shared/record/replay.ts";
import { buildRecord } from "#server/services/build-record.ts";
import { startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";
import { runWholeSurvey } from "../fixtures/whole-survey.ts";

let server: TestServer;
let team: Team;

beforeAll(async () => {
  server = await startTestServer();
  team = await startTeam(server);
  await runWholeSurvey(server, team);
}, 120_000);
afterAll(() => server.stop());

const failures = () =>
  replay(buildRecord(server.platform, team.surveyId))
    .checks.filter(({ outcome }) => outcome === "failed")
    .map(({ title, detail }) => `${title}: ${detail}`);

// Everything that a record is compared with may be changed after it was used: each event holds what stood then.
test("a whole survey replays after its settings, people and names were changed, and after an estimate at another level", async () => {
  const here = { params: { surveyId: team.surveyId } };
  const seen = await team.planner.call(readSettings, here);
  const { targets, season, ...rest } = seen.json;
  const body = {
    ...rest,
    ...{
      name: "Another name",
      timeZone: "Pacific/Auckland",
      level: "0.9",
      safetyNotes: "tides",
      sensitivity: "high" as const,
    },
    targets: targets.map((target) => ({
      ...target,
      singular: "nest",
      plural: "nests",
      countingRule: "each",
      wholeNumbers: false,
    })),
    season: { ...season, name: "spring", startsOn: "2031-03-01", endsOn: "2031-06-30" },
  };
  expect((await team.planner.call(changeSettings, { ...here, body, version: seen.headers.get("etag") })).status).toBe(
    200,
  );
  const { resultSha256 } = (await team.lead.call(readEstimate, here)).json;
  expect((await team.lead.call(keepEstimate, { ...here, body: { resultSha256 } })).status).toBe(200);
  await team.counter.call(changeName, { body: { name: "Counter the Second" } });
  await team.counter.call(leaveSurvey, here);
  const members = (await team.planner.call(listPeople, here)).json.members;
  const lead = members.find((member) => member.roles.includes("lead"));
  await team.owner.call(setRoles, { params: { ...here.params, memberId: lead?.id ?? "" }, body: { roles: [] } });
  await team.planner.call(addPerson, { ...here, body: { email: "stranger@example.org", role: "lead" } });
  await team.owner.call(changeName, { body: { name: "Owner the Second" } });
  await team.planner.call(archiveSurvey, here);
  await team.planner.call(unarchiveSurvey, here);
  expect(failures()).toEqual([]);
});
