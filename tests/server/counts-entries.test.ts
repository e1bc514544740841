import { randomUUID } from "node:crypto";
import { beforeEach, describe, expect, test } from "vitest";
import { enterCounts, listEntries } from "#shared/api/counts.ts";
import { assignVisits, listVisits, type Visit } from "#shared/api/field.ts";
import { listMembers } from "#shared/api/surveys.ts";
import { allEvents } from "#server/db/events.ts";
import { anotherSurvey, declaring, drawCells } from "../fixtures/sealed-frame.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";

const survey = surveyEachTest();

const MADE = "2031-05-02T07:00:00Z";
let visits: Visit[];
let targetId: string;

/** Ten different cells drawn. */
async function begin(): Promise<void> {
  await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
  ({ visits, targetId } = await survey.visits());
}
beforeEach(() => begin(), 30_000);

const visit = (place: number): Visit => {
  const found = visits[place];
  if (!found) throw new Error(`no visit ${place}`);
  return found;
};
type Said = { state: "counted"; value: number } | { state: "refused" | "not-in-population" | "lost" };
const entry = (place: number, said: Said, changes: Record<string, unknown> = {}) => ({
  id: randomUUID() as string,
  visitId: visit(place).id,
  targetId,
  said,
  note: "",
  madeAt: MADE,
  ...changes,
});
const enter = (entries: ReturnType<typeof entry>[], client = survey.team.lead) =>
  client.call(enterCounts, { params: survey.here(), body: { entries } });
describe("entering counts", () => {
  test("zero is a count; a state has none; each entry is one event", async () => {
    const { json } = await enter([
      entry(0, { state: "counted", value: 0 }),
      entry(1, { state: "counted", value: 12 }, { note: "by the ditch" }),
      entry(2, { state: "not-in-population" }),
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
    expect(payload).toMatchObject({ unit: visit(2).unit, state: "not-in-population", value: null });
  });

  test("the same entry sent twice, and twice at once, is kept once and answered as if new", async () => {
    const one = entry(0, { state: "counted", value: 3 });
    const before = survey.kinds().length;
    const replies = await Promise.all([enter([one]), enter([one]), enter([one])]);
    expect(replies.map((reply) => reply.status)).toEqual([200, 200, 200]);
    expect(new Set(replies.map((reply) => JSON.stringify(reply.json))).size).toBe(1);
    expect(survey.kinds()).toHaveLength(before + 1);
    const { json } = await survey.team.lead.call(listEntries, { params: { ...survey.here(), visitId: visit(0).id } });
    expect(json.entries).toHaveLength(1);
  });

  test("another content under the same id is refused", async () => {
    const one = entry(0, { state: "counted", value: 3 });
    await enter([one]);
    expect((await enter([{ ...one, said: { state: "counted", value: 4 } }])).json.code).toBe("count-invalid");
    expect((await enter([{ ...one, note: "or so" }])).json.code).toBe("count-invalid");
  });

  test("a cell with a count is amended, not written over; and then none of the entries is kept", async () => {
    await enter([entry(0, { state: "counted", value: 3 })]);
    const refused = await enter([entry(1, { state: "counted", value: 1 }), entry(0, { state: "counted", value: 4 })]);
    expect(refused.json.code).toBe("count-exists");
    expect(refused.json.detail).toContain(`Cell ${visit(0).label} has one: 3`);
    const { json } = await survey.team.lead.call(listVisits, { params: survey.here() });
    expect(json.visits.find((one) => one.id === visit(1).id)?.count.state).toBe("not-visited");
  });
});

describe("what can be entered, and by whom", () => {
  test("where objects are counted whole a fraction is refused by cell; where they are measured it is kept", async () => {
    const refused = await enter([entry(0, { state: "counted", value: 2.5 })]);
    expect(refused.json.code).toBe("count-invalid");
    expect(refused.json.detail).toContain(`2.5 in cell ${visit(0).label}`);
    await survey.begin({ wholeNumbers: false });
    await begin();
    expect((await enter([entry(0, { state: "counted", value: 2.5 })])).json.visits[0]?.count).toMatchObject({
      value: 2.5,
    });
  });

  test("negative numbers, unknown targets and cells that are not to be visited are refused", async () => {
    expect((await enter([entry(0, { state: "counted", value: -1 })])).json.code).toBe("input-invalid");
    expect((await enter([entry(0, { state: "counted", value: 1 }, { targetId: "x" })])).json.code).toBe(
      "count-invalid",
    );
    expect((await enter([entry(0, { state: "counted", value: 1 }, { visitId: "x" })])).json.code).toBe(
      "cell-not-drawn",
    );
    const other = await anotherSurvey(survey.team);
    const foreign = await other.lead.call(enterCounts, {
      params: { surveyId: other.surveyId },
      body: { entries: [entry(0, { state: "counted", value: 1 })] },
    });
    expect(foreign.json.code).toBe("cell-not-drawn");
  });

  test("a counter writes to their own cells only, and reads only theirs", async () => {
    const members = (await survey.team.planner.call(listMembers, { params: survey.here() })).json.members;
    const memberId = members.find((member) => member.roles.includes("counter"))?.id ?? "";
    const refused = await enter([entry(0, { state: "counted", value: 1 })], survey.team.counter);
    expect(refused.json.code).toBe("not-allowed");
    expect(refused.json.detail).toContain(visit(0).label);
    const params = { ...survey.here(), visitId: visit(0).id };
    expect((await survey.team.counter.call(listEntries, { params })).json.code).toBe("not-allowed");
    await survey.team.lead.call(assignVisits, {
      params: survey.here(),
      body: { visitIds: [visit(0).id], memberId, day: "" },
    });
    const kept = await enter([entry(0, { state: "counted", value: 1 })], survey.team.counter);
    expect(kept.json.visits[0]?.count).toMatchObject({ value: 1, by: "Counter" });
    expect((await survey.team.counter.call(listEntries, { params })).json.entries).toHaveLength(1);
    expect((await enter([entry(1, { state: "counted", value: 1 })], survey.team.auditor)).json.code).toBe(
      "not-allowed",
    );
  });

  test("what was kept is answered as kept when it is sent again after the cell went to somebody else", async () => {
    const { members } = (await survey.team.planner.call(listMembers, { params: survey.here() })).json;
    const idOf = (role: "counter" | "lead") => members.find((member) => member.roles.includes(role))?.id ?? "";
    const give = (memberId: string) =>
      survey.team.lead.call(assignVisits, {
        params: survey.here(),
        body: { visitIds: [visit(0).id], memberId, day: "" },
      });
    await give(idOf("counter"));
    const one = entry(0, { state: "counted", value: 1 });
    await enter([one], survey.team.counter);
    await give(idOf("lead"));
    const before = survey.kinds().length;
    const again = await enter([one], survey.team.counter);
    expect(again.status).toBe(200);
    expect(again.json.visits[0]?.count).toMatchObject({ value: 1, by: "Counter" });
    expect(survey.kinds()).toHaveLength(before);
    expect((await enter([{ ...one, id: randomUUID() }], survey.team.counter)).json.code).toBe("not-allowed");
  });
});
