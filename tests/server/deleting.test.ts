import { expect, test } from "vitest";
import { listSurveys, readSurvey } from "#shared/api/surveys.ts";
import { archiveSurvey, deleteSurvey } from "#shared/api/settings.ts";
import { newestEvent } from "#server/db/events.ts";
import { writeTx } from "#server/db/open.ts";
import { invitations } from "#server/db/schema/accounts.ts";
import { zones } from "#server/db/schema/area.ts";
import { deletedSurveys } from "#server/db/schema/installation.ts";
import { mails } from "#server/db/schema/mail.ts";
import { buildRecord } from "#server/services/build-record.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";
import { mailsTo } from "../fixtures/mails.ts";
import { anotherSurvey } from "../fixtures/sealed-frame.ts";
import { runWholeSurvey } from "../fixtures/whole-survey.ts";

const survey = surveyEachTest();
const client = () => survey.server.platform.db.$client;

/** Tables that hold nothing of any survey. */
const OF_NO_SURVEY = new Set([
  ...["accounts", "sessions", "tokens", "password_resets", "sign_in_failures", "installation"],
  ...["deleted_surveys", "__drizzle_migrations", "sqlite_sequence"],
]);

/** Every row of every table, as text: found in the schema, so that a table that comes later is looked at too. */
function everything(): Map<string, string[]> {
  const tables = client().prepare("SELECT name FROM sqlite_master WHERE type = 'table'").pluck().all() as string[];
  return new Map(
    tables.map((name) => [
      name,
      client()
        .prepare(`SELECT * FROM "${name}"`)
        .all()
        .map((row) => JSON.stringify(row))
        .toSorted(),
    ]),
  );
}

const triggers = () =>
  client().prepare("SELECT name, sql FROM sqlite_master WHERE type = 'trigger' ORDER BY name").all();

/** What no act over HTTP of the whole survey leaves: an invitation, a mail, a zone. */
function putTheRest(surveyId: string): void {
  const { platform } = survey.server;
  const at = platform.now().toISOString();
  const accountId = String(client().prepare("SELECT id FROM accounts LIMIT 1").pluck().get());
  const areaId = client().prepare("SELECT id FROM area_versions WHERE survey_id = ?").pluck().get(surveyId) as string;
  writeTx(platform.db, (tx) => {
    tx.insert(invitations)
      .values({
        ...{ id: "i1", surveyId, role: "counter", makesOwner: false, email: "new@example.org" },
        ...{ secretSha256: "ab".repeat(32), invitedBy: accountId, createdAt: at, expiresAt: at },
      })
      .run();
    tx.insert(mails)
      .values({
        ...{ id: "e1", kind: "test", surveyId, toAddress: "a@example.org", toName: "A", subject: "s", text: "t" },
        ...{ html: "h", secret: false, state: "kept", attempts: 0, lastError: "", createdAt: at },
      })
      .run();
    tx.insert(zones)
      .values({
        ...{ id: "z1", areaVersionId: areaId, kind: "leave-out", name: "pond", position: 1, reason: "" },
        ...{ geometry: "{}", createdAt: at },
      })
      .run();
  });
}

test("a deleted survey is gone from every table, and everything else is as it was", { timeout: 60_000 }, async () => {
  const before = everything();
  const guards = triggers();
  const doomed = await anotherSurvey(survey.team);
  await runWholeSurvey(survey.server, doomed);
  putTheRest(doomed.surveyId);
  const full = everything();
  const untouched = [...full].filter(([name, rows]) => rows.length === before.get(name)?.length).map(([name]) => name);
  expect(untouched.filter((name) => !OF_NO_SURVEY.has(name))).toEqual([]);

  const newest = newestEvent(survey.server.platform.db, doomed.surveyId);
  const params = { surveyId: doomed.surveyId };
  const reply = await doomed.planner.call(deleteSurvey, { params, body: { name: " Hallow Moss " } });
  expect(reply.status).toBe(200);
  for (const [name, rows] of everything()) {
    if (OF_NO_SURVEY.has(name)) continue;
    const left =
      name === "mails" ? rows.filter((row) => !JSON.stringify(row).includes("the survey was deleted")) : rows;
    expect(left, name).toEqual(before.get(name));
  }
  expect(triggers()).toEqual(guards);
  const kept = survey.server.platform.db.select().from(deletedSurveys).all();
  expect(kept).toMatchObject([{ id: doomed.surveyId, newestSequence: newest?.sequence, newestSha256: newest?.sha256 }]);
  expect((await doomed.planner.call(readSurvey, { params })).json.code).toBe("survey-not-found");
  // R7: the survey that began with the same boundary still counts the one that is gone.
  const { elsewhere } = buildRecord(survey.server.platform, survey.here().surveyId);
  expect(elsewhere.sameSource).toBeGreaterThanOrEqual(1);
  expect(kept[0]?.sourceSha256s).toHaveLength(1);
  const [told] = mailsTo(survey.server, "auditor@example.org").filter(({ kind }) => kind === "deleted");
  expect(told?.surveyId).toBeNull();
  expect(told?.text).toContain(newest?.sha256);
  expect(() => client().exec(`DELETE FROM events WHERE survey_id = '${survey.here().surveyId}'`)).toThrow(
    "events is append-only",
  );
});

test("nothing is deleted unless the name is typed as it is, nor by anybody but a planner", async () => {
  const params = survey.here();
  for (const name of ["", "hallow moss", "Hallow  Moss"]) {
    const reply = await survey.team.planner.call(deleteSurvey, { params, body: { name } });
    expect(reply).toMatchObject({ status: 422, json: { code: "name-differs" } });
  }
  for (const role of ["lead", "counter", "auditor"] as const) {
    const reply = await survey.team[role].call(deleteSurvey, { params, body: { name: "Hallow Moss" } });
    expect(reply.json.code, role).toBe("not-allowed");
  }
  expect((await survey.team.planner.call(readSurvey, { params })).status).toBe(200);
});

test("a deletion that fails half way leaves the survey, and its guards, whole", async () => {
  const { platform } = survey.server;
  const params = survey.here();
  const accountId = String(client().prepare("SELECT id FROM accounts LIMIT 1").pluck().get());
  // The last step writes this row: that it is there already makes the deletion fail at its end.
  platform.db
    .insert(deletedSurveys)
    .values({ id: params.surveyId, newestSequence: 1, newestSha256: "", deletedAt: "", deletedBy: accountId })
    .run();
  const [before, guards] = [everything(), triggers()];
  const reply = await survey.team.planner.call(deleteSurvey, { params, body: { name: "Hallow Moss" } });
  expect(reply.status).toBe(500);
  for (const [name, rows] of everything()) if (name !== "sessions") expect(rows, name).toEqual(before.get(name));
  expect(triggers()).toEqual(guards);
});

test("an archived survey can be deleted too", async () => {
  const params = survey.here();
  await survey.team.planner.call(archiveSurvey, { params });
  const reply = await survey.team.planner.call(deleteSurvey, { params, body: { name: "Hallow Moss" } });
  expect(reply.status).toBe(200);
  const { surveys } = (await survey.team.planner.call(listSurveys)).json;
  expect(surveys.map(({ id }) => id)).not.toContain(params.surveyId);
});
