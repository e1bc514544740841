import { randomUUID } from "node:crypto";
import { describe, expect, test } from "vitest";
import { amendCount, listEntries } from "#shared/api/counts.ts";
import { drawnSurveyEachTest, MADE } from "../fixtures/drawn-survey.ts";

const survey = drawnSurveyEachTest();

describe("amending", () => {
  const amend = (
    place: number,
    replaces: string,
    said: { state: "counted"; value: number } | { state: "lost" },
    changes: Record<string, unknown> = {},
    client = survey.team.lead,
  ) =>
    client.call(amendCount, {
      params: { ...survey.here(), visitId: survey.cell(place).id },
      body: {
        id: randomUUID(),
        targetId: survey.targetId,
        replaces,
        said,
        note: "",
        reason: "misread the sheet",
        madeAt: MADE,
        ...changes,
      },
    });

  test("the old value stays with who, when and why; the new one is in force", async () => {
    const first = survey.entry(0, { state: "counted", value: 3 });
    await survey.enter([first]);
    survey.server.setNow("2031-05-03T10:00:00.000Z");
    const { json } = await amend(0, first.id, { state: "counted", value: 8 }, {}, survey.team.planner);
    expect(json.count).toMatchObject({ state: "counted", value: 8, amended: true, by: "Lead" });
    const list = await survey.team.lead.call(listEntries, { params: { ...survey.here(), visitId: survey.cell(0).id } });
    expect(list.json.entries).toMatchObject([
      { value: 3, replaces: null, reason: "", enteredBy: "Lead" },
      {
        value: 8,
        replaces: first.id,
        reason: "misread the sheet",
        enteredBy: "Planner",
        enteredAt: "2031-05-03T10:00:00.000Z",
      },
    ]);
    expect(survey.kinds().at(-1)).toBe("count-amended");
    survey.server.setNow("2031-05-02T08:00:00.000Z");
  });

  test("an amendment of what is no longer in force is refused, and one sent twice is kept once", async () => {
    const first = survey.entry(0, { state: "counted", value: 3 });
    await survey.enter([first]);
    const id = randomUUID();
    const once = await amend(0, first.id, { state: "counted", value: 8 }, { id });
    const twice = await amend(0, first.id, { state: "counted", value: 8 }, { id });
    expect(twice.json).toEqual(once.json);
    const late = await amend(0, first.id, { state: "counted", value: 9 });
    expect(late.json.code).toBe("changed-meanwhile");
    expect(late.json.detail).toContain("8");
  });

  test("where nothing is written down there is nothing to amend; a reason is needed; a counter can't", async () => {
    expect((await amend(0, randomUUID(), { state: "counted", value: 1 })).json.code).toBe("count-missing");
    const first = survey.entry(0, { state: "counted", value: 3 });
    await survey.enter([first]);
    expect((await amend(0, first.id, { state: "lost" }, { reason: "" })).json.code).toBe("input-invalid");
    expect((await amend(0, first.id, { state: "counted", value: 0.5 })).json.code).toBe("count-invalid");
    expect((await amend(0, first.id, { state: "lost" }, {}, survey.team.counter)).json.code).toBe("not-allowed");
  });
});
