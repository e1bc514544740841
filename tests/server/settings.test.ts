import { randomUUID } from "node:crypto";
import { describe, expect, test } from "vitest";
import type * as z from "zod/mini";
import { readPlane, listAreas } from "#shared/api/area.ts";
import { amendCount, enterCounts } from "#shared/api/counts.ts";
import { createSurvey, readSurvey } from "#shared/api/surveys.ts";
import { replay } from "#shared/record/replay.ts";
import {
  archiveSurvey,
  changeSettings,
  readSettings,
  type SurveySettings,
  unarchiveSurvey,
} from "#shared/api/settings.ts";
import { buildRecord } from "#server/services/build-record.ts";
import { exportWaypoints } from "#server/services/export-waypoints.ts";
import { actingAs } from "../fixtures/acting-as.ts";
import { drawnSurveyEachTest } from "../fixtures/drawn-survey.ts";

const survey = drawnSurveyEachTest();

async function seen() {
  const reply = await survey.team.planner.call(readSettings, { params: survey.here() });
  return { settings: reply.json, version: reply.headers.get("etag") };
}

/** As the planner, on the version that stands now. */
async function change(part: Partial<SurveySettings>) {
  const { settings, version } = await seen();
  const body = { ...settings, ...part };
  return survey.team.planner.call(changeSettings, { params: survey.here(), body, version });
}

async function changeTarget(part: Partial<SurveySettings["targets"][number]>) {
  const { settings } = await seen();
  return change({ targets: settings.targets.map((target) => ({ ...target, ...part })) });
}

async function changeSeason(part: Partial<SurveySettings["season"]>) {
  return change({ season: { ...(await seen()).settings.season, ...part } });
}

describe("the settings of a survey", () => {
  test("are read by every role, and changed by a planner only", async () => {
    const { settings, version } = await seen();
    expect(settings).toMatchObject({
      name: "Hallow Moss",
      timeZone: "Europe/Berlin",
      level: "0.95",
      sensitivity: "open",
      safetyNotes: "",
      season: { name: "2031", startsOn: null, endsOn: null },
    });
    for (const role of ["lead", "counter", "auditor"] as const) {
      const reply = await survey.team[role].call(readSettings, { params: survey.here() });
      expect(reply.json).toEqual(settings);
      const change = { params: survey.here(), body: { ...settings, name: "Mine" }, version };
      expect((await survey.team[role].call(changeSettings, change)).json.code).toBe("not-allowed");
    }
  });

  test("a change is one event with the whole settings before and after, and stands everywhere at once", async () => {
    const { settings: before } = await seen();
    const events = survey.kinds().length;
    const part = { name: "Hallow Moss, north", timeZone: "Europe/London", level: "0.9", sensitivity: "high" } as const;
    const season = { ...before.season, name: "Summer 2031", startsOn: "2031-05-01", endsOn: "2031-05-01" };
    const targets = before.targets.map((target) => ({ ...target, plural: "warrens", countingRule: "with droppings" }));
    const reply = await change({ ...part, season, targets, safetyNotes: "  Tides.  " });
    const after = { ...part, season, targets, safetyNotes: "Tides." };
    expect(reply.json).toEqual(after);
    expect(survey.kinds().slice(events)).toEqual(["settings-changed"]);
    expect(survey.lastPayload()).toEqual({ version: 1, before, after });
    const { json } = await survey.team.counter.call(readSurvey, { params: survey.here() });
    expect(json).toMatchObject({
      ...{ name: part.name, timeZone: part.timeZone, level: part.level, safetyNotes: "Tides." },
      season: "Summer 2031",
      target: "warrens",
    });
    const failed = replay(buildRecord(survey.server.platform, survey.here().surveyId)).checks.filter(
      ({ outcome }) => outcome === "failed",
    );
    expect(failed).toEqual([]);
  });

  test("that are sent as they are make no event", async () => {
    const events = survey.kinds().length;
    expect((await change({})).status).toBe(200);
    expect(survey.kinds()).toHaveLength(events);
  });

  test("that cannot be meant are refused, and nothing changes", async () => {
    const { settings: before } = await seen();
    const refused = async (reply: Promise<{ json: { code?: string; detail?: string } }>) =>
      (await reply).json.detail ?? "";
    expect(await refused(change({ timeZone: "Europe/Atlantis" }))).toContain("“Europe/Atlantis” is no time zone");
    expect(await refused(changeSeason({ startsOn: "2031-06-02", endsOn: "2031-06-01" }))).toBe(
      "The season ends on 2031-06-01, before it starts on 2031-06-02.",
    );
    expect(await refused(changeSeason({ startsOn: "2031-02-30" }))).not.toBe("");
    expect(await refused(changeSeason({ id: "another" }))).toContain("not the survey's season");
    // Limits are computed from 0.5 to 0.9999 (shared/estimate/level.ts).
    expect(await refused(change({ level: "0.4" }))).toContain("Give one from 0.5 to 0.9999");
    expect(await refused(change({ level: "0.99995" }))).toContain("Give one from 0.5 to 0.9999");
    expect(await refused(changeTarget({ id: "another" }))).toContain("not those of the survey");
    expect(await refused(change({ targets: [...before.targets, ...before.targets] }))).toContain("not those");
    expect(await refused(change({ name: "  " }))).not.toBe("");
    expect((await seen()).settings).toEqual(before);
  });

  test("a measured target becomes whole once no count in force has decimals", async () => {
    await survey.drawAgain({ wholeNumbers: false });
    const first = survey.entry(0, { state: "counted", value: 2.5 });
    await survey.enter([first, survey.entry(1, { state: "counted", value: 3 })]);
    const refused = await changeTarget({ wholeNumbers: true });
    expect(refused.json).toMatchObject({ code: "counts-not-whole" });
    expect(refused.json.detail).toContain("One count has decimals.");
    const amendment: z.input<typeof amendCount.body> = {
      id: randomUUID(),
      targetId: survey.targetId,
      replaces: first.id,
      said: { state: "counted", value: 2 },
      note: "",
      reason: "it was two",
      madeAt: first.madeAt,
    };
    const params = { ...survey.here(), visitId: survey.cell(0).id };
    expect((await survey.team.lead.call(amendCount, { params, body: amendment })).status).toBe(200);
    expect((await changeTarget({ wholeNumbers: true })).status).toBe(200);
    const decimals = await survey.enter([survey.entry(2, { state: "counted", value: 1.5 })]);
    expect(decimals.json.code).toBe("count-invalid");
  });
});

describe("an archived survey", () => {
  test("is read and takes nothing new until it is taken out; both are events", async () => {
    const params = survey.here();
    const put = await survey.team.planner.call(archiveSurvey, { params });
    expect(put.json.archivedAt).toBe("2031-05-02T08:00:00.000Z");
    expect(survey.kinds().at(-1)).toBe("survey-archived");
    const entries = [survey.entry(0, { state: "counted", value: 1 })];
    const { settings, version } = await seen();
    const refused = [
      await survey.team.lead.call(enterCounts, { params, body: { entries } }),
      await survey.team.planner.call(changeSettings, { params, body: { ...settings, name: "x" }, version }),
      await survey.team.planner.call(archiveSurvey, { params }),
    ];
    expect(refused.map(({ json }) => json.code)).toEqual(["survey-archived", "survey-archived", "survey-archived"]);
    const area = (await survey.team.lead.call(listAreas, { params })).json.areas[0];
    expect(area).toBeDefined();
    expect(
      (await survey.team.lead.call(readPlane, { params: { ...params, areaId: area?.id ?? "", epsg: "32632" } })).status,
    ).toBe(200);

    const out = await survey.team.planner.call(unarchiveSurvey, { params });
    expect(out.json.archivedAt).toBeNull();
    expect(survey.kinds().at(-1)).toBe("survey-unarchived");
    expect((await survey.team.lead.call(enterCounts, { params, body: { entries } })).status).toBe(200);
  });

  // The file is made in a worker: between the look at the archive and the event others act.
  test("takes nothing that was begun before it was archived, either", async () => {
    const wanted = { format: "csv", nameLength: 10, prefix: "", memberId: null } as const;
    const meanwhile = () => survey.team.planner.call(archiveSurvey, { params: survey.here() });
    const made = exportWaypoints(actingAs(survey, "lead", meanwhile), wanted, new AbortController().signal);
    await expect(made).rejects.toMatchObject({ code: "survey-archived" });
    expect(survey.kinds().at(-1)).toBe("survey-archived");
  });

  test("taking out what is not in the archive does nothing", async () => {
    const events = survey.kinds().length;
    expect((await survey.team.planner.call(unarchiveSurvey, { params: survey.here() })).status).toBe(200);
    expect(survey.kinds()).toHaveLength(events);
  });

  test("a new survey is none", async () => {
    const { json } = await survey.team.stranger.call(createSurvey, {
      body: {
        ...{ name: "Fold", targetSingular: "hare", targetPlural: "hares", countingRule: "", wholeNumbers: true },
        ...{ seasonName: "2031", timeZone: "UTC", safetyNotes: "" },
      },
    });
    expect(json.archivedAt).toBeNull();
  });
});
