import { randomUUID } from "node:crypto";
import { describe, expect, test } from "vitest";
import { amendCount, enterCounts } from "#shared/api/counts.ts";
import { readDraw, withdrawDraw } from "#shared/api/draw.ts";
import { closePick } from "#shared/api/field.ts";
import { drawEntries } from "#shared/draw/draw.ts";
import { replay } from "#shared/record/replay.ts";
import { buildRecord } from "#server/services/build-record.ts";
import { declaring, drawCells } from "../fixtures/sealed-frame.ts";
import { surveyEachTest, visitAt } from "../fixtures/each-survey.ts";

const survey = surveyEachTest();
const MADE = "2031-05-02T07:00:00Z";

const close = (visitId: string, state = "refused", id: string = randomUUID(), reason = "the owner said no") =>
  survey.team.lead.call(closePick, {
    params: { ...survey.here(), visitId },
    body: { id, state: state as never, reason },
  });

describe("closing picks", () => {
  test("closing a cell opens the next reserve, strictly in order, and its visit", async () => {
    const draw = await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    const before = await survey.visits();
    const target = visitAt(before.visits, 4);
    const { json } = await close(target.id);
    const reserve = draw.entries[10];
    expect(json).toEqual({
      closed: [4],
      opened: [{ position: 11, label: reserve?.label, repeatsCountedCell: false }],
      passedOver: [],
      reservesLeft: 4,
      unreplaced: 0,
    });
    const after = await survey.visits();
    expect(visitAt(after.visits, 4)).toMatchObject({ state: "closed", count: { state: "refused", by: "Lead" } });
    expect(visitAt(after.visits, 11)).toMatchObject({ state: "in-use", openedFor: 4, unit: reserve?.unit });
    expect([after.picks, after.reservesLeft]).toEqual([10, 4]);
    expect(survey.kinds().at(-1)).toBe("pick-closed");
    expect(survey.lastPayload()).toMatchObject({
      unit: target.unit,
      closed: [4],
      opened: [11],
      passedOver: [],
      state: "refused",
    });
    const read = await survey.team.auditor.call(readDraw, { params: { ...survey.here(), drawId: draw.id } });
    expect(read.json.entries.map((entry) => entry.state)).toEqual([
      ...["in-use", "in-use", "in-use", "closed", "in-use", "in-use", "in-use", "in-use", "in-use", "in-use"],
      ...["in-use", "reserve", "reserve", "reserve", "reserve"],
    ]);
    expect(read.json.entries[10]?.openedFor).toBe(4);
    expect(read.json.entries[3]?.count).toBe("refused");
  });

  test("a cell that was picked twice opens two reserves", async () => {
    const draw = await drawCells(
      survey.team,
      declaring(survey.frame.frameId, { design: { kind: "srs-wr", n: 40 }, reserves: 20 }),
    );
    const repeat = draw.entries.find((entry) => entry.repeatOf !== null && !entry.reserve);
    const visit = (await survey.visits()).visits.find((one) => one.unit === repeat?.unit);
    const times = visit?.orders.length ?? 0;
    expect(times).toBeGreaterThan(1);
    const { json } = await close(visit?.id ?? "");
    expect(json.closed).toEqual(visit?.orders);
    expect(json.opened).toHaveLength(times);
    expect(json.opened.map((one) => one.position)).toEqual(
      [...json.opened.map((one) => one.position)].toSorted((a, b) => a - b),
    );
    expect((await survey.visits()).picks).toBe(40);
  });

  test("sent twice it answers the same and opens no more", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    const visit = visitAt((await survey.visits()).visits, 1);
    const id = randomUUID();
    const [first, second] = await Promise.all([close(visit.id, "unsafe", id), close(visit.id, "unsafe", id)]);
    expect(second.json).toEqual(first.json);
    expect((await survey.visits()).reservesLeft).toBe(4);
    const other = await close(visit.id, "lost");
    expect(other.json.code).toBe("pick-not-in-use");
  });
});

describe("what is closed and what is not", () => {
  test("a counted cell is not closed: its count is amended", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId));
    const { visits: all, targetId } = await survey.visits();
    const visit = visitAt(all, 1);
    const entry = {
      id: randomUUID(),
      visitId: visit.id,
      targetId,
      said: { state: "counted" as const, value: 0 },
      note: "",
      madeAt: "2031-05-02T07:00:00Z",
    };
    await survey.team.lead.call(enterCounts, { params: survey.here(), body: { entries: [entry] } });
    const refused = await close(visit.id);
    expect(refused.json.code).toBe("count-exists");
    expect((await survey.visits()).reservesLeft).toBe(5);
  });

  test("a state that a counter brought back is kept; another one amends it", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    const { visits: all, targetId } = await survey.visits();
    const [one, two] = [visitAt(all, 1), visitAt(all, 2)];
    const said = { state: "unsafe" as const };
    for (const visit of [one, two]) {
      const entry = {
        id: randomUUID(),
        visitId: visit.id,
        targetId,
        said,
        note: "slippery",
        madeAt: "2031-05-02T07:00:00Z",
      };
      await survey.team.lead.call(enterCounts, { params: survey.here(), body: { entries: [entry] } });
    }
    // What a counter says opens nothing yet.
    expect((await survey.visits()).reservesLeft).toBe(5);
    await close(one.id, "unsafe");
    await close(two.id, "not-reached");
    const after = (await survey.visits()).visits;
    expect(visitAt(after, 1).count).toMatchObject({ state: "unsafe", amended: false, note: "slippery" });
    expect(visitAt(after, 2).count).toMatchObject({ state: "not-reached", amended: true });
  });

  // R6: a list that runs short is lengthened by the same stream: the longer list begins with the shorter one.
  test("a list that runs short is lengthened by its own stream, on record", async () => {
    const design = { kind: "srs-wr" as const, n: 40 };
    const draw = await drawCells(survey.team, declaring(survey.frame.frameId, { design, reserves: 1 }), "a typed seed");
    const repeat = draw.entries.find((entry) => entry.repeatOf !== null && !entry.reserve);
    const visit = (await survey.visits()).visits.find((one) => one.unit === repeat?.unit);
    const times = visit?.orders.length ?? 0;
    expect(times).toBe(2);
    const frame = { sha256: survey.frame.frameSha256, units: 70 };
    const longer = drawEntries(frame, design, "a typed seed", "sha256-counter", 2)[0]?.entries ?? [];
    const { json } = await close(visit?.id ?? "");
    expect(json).toMatchObject({ reservesLeft: 0, unreplaced: 0, passedOver: [] });
    expect(json.opened.map(({ position }) => position)).toEqual([41, 42]);
    expect(survey.kinds().slice(-2)).toEqual(["list-lengthened", "pick-closed"]);
    const params = { ...survey.here(), drawId: draw.id };
    const { entries } = (await survey.team.auditor.call(readDraw, { params })).json;
    expect(entries.map(({ position, unit }) => [position, unit])).toEqual(
      longer.map(({ position, unit }) => [position, unit]),
    );
    expect((await survey.visits()).picks).toBe(40);
    const report = replay(buildRecord(survey.server.platform, survey.team.surveyId));
    expect(report.checks.filter(({ outcome }) => outcome === "failed")).toEqual([]);
  });

  test("without replacement a list ends with the frame, and a pick that finds no reserve is told", async () => {
    const design = { kind: "srs-wor" as const, n: 69 };
    await drawCells(survey.team, declaring(survey.frame.frameId, { design, reserves: 0 }));
    const { visits: all } = await survey.visits();
    expect((await close(visitAt(all, 1).id)).json).toMatchObject({
      opened: [{ position: 70 }],
      reservesLeft: 0,
      unreplaced: 0,
    });
    expect((await close(visitAt(all, 2).id)).json).toMatchObject({ opened: [], reservesLeft: 0, unreplaced: 1 });
    expect((await survey.visits()).picks).toBe(68);
  });

  test("a cell of a withdrawn draw can't be closed", async () => {
    const draw = await drawCells(survey.team, declaring(survey.frame.frameId));
    const visit = visitAt((await survey.visits()).visits, 1);
    await survey.team.planner.call(withdrawDraw, {
      params: { ...survey.here(), drawId: draw.id },
      body: { reason: "drawn too early" },
    });
    expect((await close(visit.id)).json.code).toBe("pick-not-in-use");
  });

  test("a counter can't close", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId));
    const visit = visitAt((await survey.visits()).visits, 1);
    const body = { id: randomUUID(), state: "lost" as const, reason: "the sheet got wet" };
    const refused = await survey.team.counter.call(closePick, {
      params: { ...survey.here(), visitId: visit.id },
      body,
    });
    expect(refused.json.code).toBe("not-allowed");
  });
});

describe("a closed cell and its count", () => {
  // R6: the reserve that a closed cell opened stays when the cell is counted after all; a counted cell that is amended to
  // a closing state leaves the picks and opens none.
  test("counted after all it is in use again; amended to a closing state it leaves and opens nothing", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    const first = await survey.visits();
    const visit = visitAt(first.visits, 3);
    await close(visit.id, "lost");
    const amend = async (said: { state: "counted"; value: number } | { state: "refused" }) => {
      const now = visitAt((await survey.visits()).visits, 3).count;
      const replaces = now.state === "not-visited" ? "" : now.entryId;
      const body = {
        id: randomUUID(),
        targetId: first.targetId,
        replaces,
        said,
        note: "",
        reason: "the sheet was found",
        madeAt: "2031-05-02T07:00:00Z",
      };
      return survey.team.lead.call(amendCount, { params: { ...survey.here(), visitId: visit.id }, body });
    };
    expect((await amend({ state: "counted", value: 7 })).json).toMatchObject({
      state: "in-use",
      count: { state: "counted", value: 7 },
    });
    expect(await survey.visits()).toMatchObject({ picks: 11, reservesLeft: 4 });
    expect((await amend({ state: "refused" })).json).toMatchObject({ state: "closed", count: { state: "refused" } });
    expect(await survey.visits()).toMatchObject({ picks: 10, reservesLeft: 4 });
  });

  // The id that closed it, sent once more: after an amendment to a number there is a count; after one to a closing state
  // the cell is closed by that act, and the first closing is answered as it was.
  test("closed again under the same id after an amendment it is refused by name or answered as before", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    const { visits: all, targetId } = await survey.visits();
    const visit = visitAt(all, 3);
    const id = randomUUID();
    const first = await close(visit.id, "lost", id);
    let replaces: string = id;
    const amend = async (said: { state: "counted"; value: number } | { state: "refused" | "lost" }) => {
      const body = {
        id: randomUUID(),
        targetId,
        replaces,
        said,
        note: "",
        reason: "the sheet was found",
        madeAt: MADE,
      };
      const reply = await survey.team.lead.call(amendCount, { params: { ...survey.here(), visitId: visit.id }, body });
      expect(reply.status).toBe(200);
      replaces = body.id;
    };
    await amend({ state: "refused" });
    expect((await close(visit.id, "lost", id)).json).toEqual(first.json);
    await amend({ state: "counted", value: 7 });
    expect((await close(visit.id, "lost", id)).json.code).toBe("count-exists");
    await amend({ state: "lost" });
    expect((await close(visit.id, "lost", id)).json).toEqual(first.json);
    expect((await close(visit.id, "refused", id)).json.code).toBe("pick-not-in-use");
  });

  test("a state that was kept and amended since does not close the cell under its old id", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    const { visits: all, targetId } = await survey.visits();
    const visit = visitAt(all, 3);
    const id = randomUUID();
    const said = { state: "unsafe" as const };
    const entry = { id, visitId: visit.id, targetId, said, note: "", madeAt: MADE };
    await survey.team.lead.call(enterCounts, { params: survey.here(), body: { entries: [entry] } });
    const amendment = {
      ...{ id: randomUUID(), targetId, replaces: id, note: "" },
      reason: "said wrongly",
      madeAt: MADE,
    };
    await survey.team.lead.call(amendCount, {
      params: { ...survey.here(), visitId: visit.id },
      body: { ...amendment, said: { state: "lost" } },
    });
    expect((await close(visit.id, "unsafe", id)).json.code).toBe("count-invalid");
    expect((await survey.visits()).reservesLeft).toBe(5);
  });
});
