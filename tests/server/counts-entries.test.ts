import { randomUUID } from "node:crypto";
import { describe, expect, test } from "vitest";
import { enterCounts, listEntries } from "#shared/api/counts.ts";
import { assignVisits, listVisits } from "#shared/api/field.ts";
import { listPeople } from "#shared/api/people.ts";
import { allEvents } from "#server/db/events.ts";
import { drawnSurveyEachTest, MADE } from "../fixtures/drawn-survey.ts";
import { anotherSurvey } from "../fixtures/sealed-frame.ts";

const survey = drawnSurveyEachTest();

describe("entering counts", () => {
  test("zero is a count; a state has none; each entry is one event", async () => {
    const { json } = await survey.enter([
      survey.entry(0, { state: "counted", value: 0 }),
      survey.entry(1, { state: "counted", value: 12 }, { note: "by the ditch" }),
      survey.entry(2, { state: "not-in-population" }),
    ]);
    expect(json.visits.map((one) => one.count)).toMatchObject([
      { state: "counted", value: 0, by: "Lead", at: MADE, amended: false },
      { state: "counted", value: 12, note: "by the ditch" },
      { state: "not-in-population" },
    ]);
    expect(json.visits[2]?.count).not.toHaveProperty("value");
    expect(survey.kinds().slice(-3)).toEqual(["count-entered", "count-entered", "count-entered"]);
    const payload = JSON.parse(
      allEvents(survey.server.platform.db, survey.team.surveyId).at(-1)?.payload ?? "",
    ) as object;
    expect(payload).toMatchObject({ unit: survey.cell(2).unit, state: "not-in-population", value: null });
  });

  test("the same entry sent twice, and twice at once, is kept once and answered as if new", async () => {
    const one = survey.entry(0, { state: "counted", value: 3 });
    const before = survey.kinds().length;
    const replies = await Promise.all([survey.enter([one]), survey.enter([one]), survey.enter([one])]);
    expect(replies.map((reply) => reply.status)).toEqual([200, 200, 200]);
    expect(new Set(replies.map((reply) => JSON.stringify(reply.json))).size).toBe(1);
    expect(survey.kinds()).toHaveLength(before + 1);
    const { json } = await survey.team.lead.call(listEntries, {
      params: { ...survey.here(), visitId: survey.cell(0).id },
    });
    expect(json.entries).toHaveLength(1);
  });

  test("another content under the same id is refused", async () => {
    const one = survey.entry(0, { state: "counted", value: 3 });
    await survey.enter([one]);
    expect((await survey.enter([{ ...one, said: { state: "counted", value: 4 } }])).json.code).toBe("count-invalid");
    expect((await survey.enter([{ ...one, note: "or so" }])).json.code).toBe("count-invalid");
  });

  test("a cell with a count is amended, not written over; and then none of the entries is kept", async () => {
    await survey.enter([survey.entry(0, { state: "counted", value: 3 })]);
    const refused = await survey.enter([
      survey.entry(1, { state: "counted", value: 1 }),
      survey.entry(0, { state: "counted", value: 4 }),
    ]);
    expect(refused.json.code).toBe("count-exists");
    expect(refused.json.detail).toContain(`Cell ${survey.cell(0).label} has one: 3`);
    const { json } = await survey.team.lead.call(listVisits, { params: survey.here() });
    expect(json.visits.find((one) => one.id === survey.cell(1).id)?.count.state).toBe("not-visited");
  });
});

describe("what can be entered, and by whom", () => {
  test("where objects are counted whole a fraction is refused by cell; where they are measured it is kept", async () => {
    const refused = await survey.enter([survey.entry(0, { state: "counted", value: 2.5 })]);
    expect(refused.json.code).toBe("count-invalid");
    expect(refused.json.detail).toContain(`2.5 in cell ${survey.cell(0).label}`);
    await survey.drawAgain({ wholeNumbers: false });
    expect(
      (await survey.enter([survey.entry(0, { state: "counted", value: 2.5 })])).json.visits[0]?.count,
    ).toMatchObject({
      value: 2.5,
    });
  });

  test("negative numbers, unknown targets and cells that are not to be visited are refused", async () => {
    expect((await survey.enter([survey.entry(0, { state: "counted", value: -1 })])).json.code).toBe("input-invalid");
    expect((await survey.enter([survey.entry(0, { state: "counted", value: 1 }, { targetId: "x" })])).json.code).toBe(
      "count-invalid",
    );
    expect((await survey.enter([survey.entry(0, { state: "counted", value: 1 }, { visitId: "x" })])).json.code).toBe(
      "cell-not-drawn",
    );
    const other = await anotherSurvey(survey.team);
    const foreign = await other.lead.call(enterCounts, {
      params: { surveyId: other.surveyId },
      body: { entries: [survey.entry(0, { state: "counted", value: 1 })] },
    });
    expect(foreign.json.code).toBe("cell-not-drawn");
  });

  test("a counter writes to their own cells only, and reads only theirs", async () => {
    const members = (await survey.team.planner.call(listPeople, { params: survey.here() })).json.members;
    const memberId = members.find((member) => member.roles.includes("counter"))?.id ?? "";
    const refused = await survey.enter([survey.entry(0, { state: "counted", value: 1 })], "counter");
    expect(refused.json.code).toBe("not-allowed");
    expect(refused.json.detail).toContain(survey.cell(0).label);
    const params = { ...survey.here(), visitId: survey.cell(0).id };
    expect((await survey.team.counter.call(listEntries, { params })).json.code).toBe("not-allowed");
    await survey.team.lead.call(assignVisits, {
      params: survey.here(),
      body: { visitIds: [survey.cell(0).id], memberId, day: "" },
    });
    const kept = await survey.enter([survey.entry(0, { state: "counted", value: 1 })], "counter");
    expect(kept.json.visits[0]?.count).toMatchObject({ value: 1, by: "Counter" });
    expect((await survey.team.counter.call(listEntries, { params })).json.entries).toHaveLength(1);
    expect((await survey.enter([survey.entry(1, { state: "counted", value: 1 })], "auditor")).json.code).toBe(
      "not-allowed",
    );
  });

  test("what was kept is answered as kept when it is sent again after the cell went to somebody else", async () => {
    const { members } = (await survey.team.planner.call(listPeople, { params: survey.here() })).json;
    const idOf = (role: "counter" | "lead") => members.find((member) => member.roles.includes(role))?.id ?? "";
    const give = (memberId: string, from?: string) =>
      survey.team.lead.call(assignVisits, {
        params: survey.here(),
        body: {
          visitIds: [survey.cell(0).id],
          memberId,
          day: "",
          seen: from === undefined ? [] : [{ visitId: survey.cell(0).id, memberId: from, day: "" }],
        },
      });
    await give(idOf("counter"));
    const one = survey.entry(0, { state: "counted", value: 1 });
    await survey.enter([one], "counter");
    await give(idOf("lead"), idOf("counter"));
    const before = survey.kinds().length;
    const again = await survey.enter([one], "counter");
    expect(again.status).toBe(200);
    expect(again.json.visits[0]?.count).toMatchObject({ value: 1, by: "Counter" });
    expect(survey.kinds()).toHaveLength(before);
    expect((await survey.enter([{ ...one, id: randomUUID() }], "counter")).json.code).toBe("not-allowed");
  });
});
