import { expect, test } from "vitest";
import { listAreas, readAreaFile, readPlane } from "#shared/api/area.ts";
import { listFrames } from "#shared/api/frame.ts";
import { archiveSurvey, changeSettings, copySurvey, readSettings } from "#shared/api/settings.ts";
import { listSurveys } from "#shared/api/surveys.ts";
import { replay } from "#shared/record/replay.ts";
import { allEvents, newestEvent } from "#server/db/events.ts";
import { membersOf } from "#server/db/members.ts";
import { targets } from "#server/db/schema/surveys.ts";
import { buildRecord } from "#server/services/build-record.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";
import { mailsTo } from "../fixtures/mails.ts";
import { putSealedFrame } from "../fixtures/sealed-frame.ts";

const survey = surveyEachTest();
const db = () => survey.server.platform.db;

async function copy(part: Partial<{ name: string; seasonName: string; withPeople: boolean }> = {}) {
  const body = { name: "Hallow Moss 2032", seasonName: "2032", withPeople: false, ...part };
  const reply = await survey.team.planner.call(copySurvey, { params: survey.here(), body });
  expect(reply.status, reply.json.detail).toBe(200);
  return reply.json;
}

function eventsOf(surveyId: string) {
  return allEvents(db(), surveyId).map(({ kind, payload }) => ({ kind, payload: JSON.parse(payload) as unknown }));
}

function failedChecks(surveyId: string) {
  return replay(buildRecord(survey.server.platform, surveyId)).checks.filter(({ outcome }) => outcome === "failed");
}

test("a copy has the settings, the boundary and the cells as a draft, under ids of its own", async () => {
  const seen = await survey.team.planner.call(readSettings, { params: survey.here() });
  const settings = { ...seen.json, sensitivity: "high" as const, safetyNotes: "Tides.", level: "0.9" };
  const version = seen.headers.get("etag");
  await survey.team.planner.call(changeSettings, { params: survey.here(), body: settings, version });
  const from = newestEvent(db(), survey.here().surveyId);
  const made = await copy();
  expect(made).toMatchObject({ name: "Hallow Moss 2032", season: "2032", roles: ["planner"], archivedAt: null });
  const params = { surveyId: made.id };

  const copied = (await survey.team.planner.call(readSettings, { params })).json;
  expect(copied).toEqual({
    ...settings,
    name: "Hallow Moss 2032",
    targets: [{ ...settings.targets[0], id: copied.targets[0]?.id }],
    season: { id: copied.season.id, name: "2032", startsOn: null, endsOn: null },
  });
  expect(copied.targets[0]?.id).not.toBe(settings.targets[0]?.id);

  const [area] = (await survey.team.planner.call(listAreas, { params })).json.areas;
  const [before] = (await survey.team.planner.call(listAreas, { params: survey.here() })).json.areas;
  expect(area).toMatchObject({ number: 1, report: before?.report, importedBy: "Planner" });
  expect(area?.id).not.toBe(before?.id);
  const file = async (surveyId: string, areaId = "") =>
    (await survey.team.planner.call(readAreaFile, { params: { surveyId, areaId } })).bytes;
  expect(await file(made.id, area?.id)).toEqual(await file(survey.here().surveyId, before?.id));
  const plane = { params: { ...params, areaId: area?.id ?? "", epsg: "32632" } };
  expect((await survey.team.planner.call(readPlane, plane)).status).toBe(200);

  const { frames } = (await survey.team.planner.call(listFrames, { params })).json;
  const [sealed] = (await survey.team.planner.call(listFrames, { params: survey.here() })).json.frames;
  expect(frames).toHaveLength(1);
  expect(frames[0]).toMatchObject({ state: "draft", number: 1, spec: { ...sealed?.spec, areaId: area?.id } });

  const events = eventsOf(made.id);
  expect(events.map(({ kind }) => kind)).toEqual(["survey-created", "survey-copied", "member-added", "area-imported"]);
  expect(events[1]?.payload).toEqual({ version: 1, from: survey.here().surveyId, newestSha256: from?.sha256 });
  expect(failedChecks(made.id)).toEqual([]);
});

test("people come along in their roles where that was asked for, each under a new id", async () => {
  const made = await copy({ withPeople: true });
  const roles = (surveyId: string) =>
    membersOf(db(), surveyId)
      .map(({ email, role }) => `${email} ${role}`)
      .toSorted();
  expect(roles(made.id)).toEqual(roles(survey.here().surveyId));
  const ids = new Set(membersOf(db(), survey.here().surveyId).map(({ id }) => id));
  expect(membersOf(db(), made.id).filter(({ id }) => ids.has(id))).toEqual([]);
  expect(eventsOf(made.id).filter(({ kind }) => kind === "member-added")).toHaveLength(4);
  expect(failedChecks(made.id)).toEqual([]);
  const { surveys } = (await survey.team.counter.call(listSurveys)).json;
  expect(surveys.map(({ id }) => id)).toContain(made.id);
  const told = (email: string) => mailsTo(survey.server, email).filter(({ surveyId }) => surveyId === made.id);
  expect(told("counter@example.org").map(({ subject }) => subject)).toEqual([
    "Hallow Moss 2032: you are its counter now",
  ]);
  expect(told("planner@example.org")).toEqual([]);
});

test("the newest boundary and the newest frame are the ones that are copied", async () => {
  putSealedFrame(survey.server, survey.here().surveyId, { number: 2, countIn: "whole", draft: true });
  const made = await copy();
  const { frames } = (await survey.team.planner.call(listFrames, { params: { surveyId: made.id } })).json;
  expect(frames).toHaveLength(1);
  expect(frames[0]).toMatchObject({ number: 1, state: "draft", spec: { countIn: "whole" } });
});

test("an archived survey can be copied, and its copy is in work", async () => {
  await survey.team.planner.call(archiveSurvey, { params: survey.here() });
  expect((await copy()).archivedAt).toBeNull();
});

test("several targets all come along, and the record still replays", async () => {
  const { surveyId } = survey.here();
  const more = { id: "more", surveyId, position: 2, singular: "nest", plural: "nests", countingRule: "" };
  db()
    .insert(targets)
    .values({ ...more, wholeNumbers: true })
    .run();
  const made = await copy();
  expect(made.targets.map(({ plural }) => plural)).toEqual(["burrows", "nests"]);
  expect(failedChecks(made.id)).toEqual([]);
});
