import { eq } from "drizzle-orm";
import { describe, expect, test } from "vitest";
import { assignVisits, listVisits } from "#shared/api/field.ts";
import { listPeople } from "#shared/api/people.ts";
import { accounts } from "#server/db/schema/accounts.ts";
import { anotherSurvey, declaring, drawCells } from "../fixtures/sealed-frame.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";

const survey = surveyEachTest();

describe("the cells to visit", () => {
  test("there is none before a draw", async () => {
    const { json } = await survey.team.lead.call(listVisits, { params: survey.here() });
    expect(json).toMatchObject({
      drawId: null,
      frameId: null,
      visits: [],
      picks: 0,
      reservesLeft: 0,
      completePrefix: 0,
    });
  });

  // Column c, row r of 20 m from (0, 0): centre at E 20c + 10, N 20r + 10. UTM 32N has its middle at 9° E and E 500 000.
  test("each has its centre in plane metres and degrees, its share and its places in the draw", async () => {
    const draw = await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wr", n: 40 } }));
    const { visits: all, picks, reservesLeft } = await survey.visits();
    expect([picks, reservesLeft]).toEqual([40, 5]);
    for (const visit of all) {
      expect(visit.centre.eastM).toBe(visit.column * 20 + 10);
      expect(visit.centre.northM).toBe(visit.row * 20 + 10);
      expect(visit.centre.lng).toBeGreaterThan(9);
      expect(visit.centre.lng).toBeLessThan(9.003);
      expect(visit.centre.lat).toBeCloseTo(49.65, 1);
      const positions = draw.entries.filter((entry) => entry.unit === visit.unit && !entry.reserve);
      expect(visit.orders).toEqual(positions.map((entry) => entry.position));
      expect(visit.label).toBe(positions[0]?.label);
      expect(visit.count).toEqual({ state: "not-visited" });
    }
    // The list is in draw order.
    const firsts = all.map((visit) => visit.orders[0] ?? 0);
    expect(firsts).toEqual(firsts.toSorted((a, b) => a - b));
    // The northernmost row of the field is cut at 150 m: its cells are half inside.
    const north = all.find((visit) => visit.row === 275_007 && visit.column > 25_005);
    if (north) expect(north.shareBillionths).toBe(500_000_000);
  });
});

const seenWith = (visitId = "", memberId: string, day: string) => [{ visitId, memberId, day }];

describe("assigning", () => {
  test("cells are given for a day, given to another and taken back; each is an event", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId));
    const { visits: all } = await survey.visits();
    const ids = all.slice(0, 3).map((visit) => visit.id);
    const [counter, lead] = [await survey.memberWith("counter"), await survey.memberWith("lead")];
    const given = await survey.team.lead.call(assignVisits, {
      params: survey.here(),
      body: { visitIds: ids, memberId: counter, day: "Tuesday" },
    });
    expect(given.json).toEqual({ assigned: 3 });
    expect(survey.lastPayload()).toMatchObject({
      member: counter,
      day: "Tuesday",
      units: all.slice(0, 3).map((v) => v.unit),
    });
    const mine = await survey.team.counter.call(listVisits, { params: survey.here() });
    expect(mine.json.visits.map((visit) => visit.id)).toEqual(ids);
    expect(mine.json.visits[0]?.assignedTo).toEqual({ memberId: counter, name: "Counter", day: "Tuesday" });

    await survey.team.lead.call(assignVisits, {
      params: survey.here(),
      body: { visitIds: ids.slice(0, 1), memberId: lead, day: "", seen: seenWith(ids[0], counter, "Tuesday") },
    });
    await survey.team.lead.call(assignVisits, {
      params: survey.here(),
      body: { visitIds: ids.slice(1, 2), memberId: null, day: "", seen: seenWith(ids[1], counter, "Tuesday") },
    });
    const left = await survey.team.counter.call(listVisits, { params: survey.here() });
    expect(left.json.visits.map((visit) => visit.id)).toEqual(ids.slice(2));
    expect(survey.kinds().at(-1)).toBe("cells-assigned");
  });

  test("somebody who does not count, or is not here, gets no cells; nor does a cell of another survey change", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId));
    const [visit] = (await survey.visits()).visits;
    const visitIds = [visit?.id ?? ""];
    const auditor = await survey.memberWith("auditor");
    const toAuditor = await survey.team.lead.call(assignVisits, {
      params: survey.here(),
      body: { visitIds, memberId: auditor, day: "" },
    });
    expect(toAuditor.json.code).toBe("not-allowed");
    const toNobody = await survey.team.lead.call(assignVisits, {
      params: survey.here(),
      body: { visitIds, memberId: "nobody", day: "" },
    });
    expect(toNobody.json.code).toBe("not-found");
    const other = await anotherSurvey(survey.team);
    const foreign = await other.lead.call(assignVisits, {
      params: { surveyId: other.surveyId },
      body: { visitIds, memberId: null, day: "" },
    });
    expect(foreign.json.code).toBe("cell-not-drawn");
  });

  test("nobody is sent out whose account is closed, and the list of people says it", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId));
    const [visit] = (await survey.visits()).visits;
    const counter = await survey.memberWith("counter");
    const { db } = survey.server.platform;
    const closed = (at: string | null): void => {
      db.update(accounts).set({ closedAt: at }).where(eq(accounts.email, "counter@example.org")).run();
    };
    closed("2031-05-02T07:00:00Z");
    const reply = await survey.team.lead.call(assignVisits, {
      params: survey.here(),
      body: { visitIds: [visit?.id ?? ""], memberId: counter, day: "" },
    });
    const { members } = (await survey.team.lead.call(listPeople, { params: survey.here() })).json;
    closed(null);
    expect(reply.json.code).toBe("account-closed");
    expect(members.filter(({ isClosed }) => isClosed).map(({ id }) => id)).toEqual([counter]);
  });
});
