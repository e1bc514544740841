import { createHash, randomUUID } from "node:crypto";
import { spawnSync } from "node:child_process";
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { amendCount, enterCounts } from "#shared/api/counts.ts";
import { type DrawDetail, readDraw, withdrawDraw } from "#shared/api/draw.ts";
import { assignVisits, closePick, exportWaypoints, listVisits, type Visit } from "#shared/api/field.ts";
import { listMembers } from "#shared/api/surveys.ts";
import { allEvents } from "#server/db/events.ts";
import { anotherSurvey, declaring, drawCells, putSealedFrame, type SealedFrame } from "../fixtures/sealed-frame.ts";
import { startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";

let server: TestServer;
let team: Team;
let frame: SealedFrame;

beforeAll(async () => {
  server = await startTestServer();
  team = await startTeam(server);
}, 60_000);
afterAll(() => server.stop());
beforeEach(async () => {
  team = await anotherSurvey(team);
  frame = putSealedFrame(server, team.surveyId);
});

const here = () => ({ surveyId: team.surveyId });
const lastEvent = () => allEvents(server.platform.db, team.surveyId).at(-1);
const payloadOf = (event = lastEvent()) => JSON.parse(event?.payload ?? "{}") as Record<string, unknown>;
const visits = async () => (await team.planner.call(listVisits, { params: here() })).json;
const memberWith = async (role: string): Promise<string> => {
  const { json } = await team.planner.call(listMembers, { params: here() });
  return json.members.find((member) => member.roles.includes(role as never))?.id ?? "";
};
const visitAt = (all: readonly Visit[], position: number): Visit => {
  const found = all.find((visit) => visit.orders.includes(position));
  if (!found) throw new Error(`nothing at ${position}`);
  return found;
};

describe("the cells to visit", () => {
  test("there is none before a draw", async () => {
    const { json } = await team.lead.call(listVisits, { params: here() });
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
    const draw = await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wr", n: 40 } }));
    const { visits: all, picks, reservesLeft } = await visits();
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

describe("assigning", () => {
  test("cells are given for a day, given to another and taken back; each is an event", async () => {
    await drawCells(team, declaring(frame.frameId));
    const { visits: all } = await visits();
    const ids = all.slice(0, 3).map((visit) => visit.id);
    const [counter, lead] = [await memberWith("counter"), await memberWith("lead")];
    const given = await team.lead.call(assignVisits, {
      params: here(),
      body: { visitIds: ids, memberId: counter, day: "Tuesday" },
    });
    expect(given.json).toEqual({ assigned: 3 });
    expect(payloadOf()).toMatchObject({ member: counter, day: "Tuesday", units: all.slice(0, 3).map((v) => v.unit) });
    const mine = await team.counter.call(listVisits, { params: here() });
    expect(mine.json.visits.map((visit) => visit.id)).toEqual(ids);
    expect(mine.json.visits[0]?.assignedTo).toEqual({ memberId: counter, name: "Counter", day: "Tuesday" });

    await team.lead.call(assignVisits, {
      params: here(),
      body: { visitIds: ids.slice(0, 1), memberId: lead, day: "" },
    });
    await team.lead.call(assignVisits, {
      params: here(),
      body: { visitIds: ids.slice(1, 2), memberId: null, day: "" },
    });
    const left = await team.counter.call(listVisits, { params: here() });
    expect(left.json.visits.map((visit) => visit.id)).toEqual(ids.slice(2));
    expect(lastEvent()?.kind).toBe("cells-assigned");
  });

  test("somebody who does not count, or is not here, gets no cells; nor does a cell of another survey change", async () => {
    await drawCells(team, declaring(frame.frameId));
    const [visit] = (await visits()).visits;
    const visitIds = [visit?.id ?? ""];
    const auditor = await memberWith("auditor");
    const toAuditor = await team.lead.call(assignVisits, {
      params: here(),
      body: { visitIds, memberId: auditor, day: "" },
    });
    expect(toAuditor.json.code).toBe("not-allowed");
    const toNobody = await team.lead.call(assignVisits, {
      params: here(),
      body: { visitIds, memberId: "nobody", day: "" },
    });
    expect(toNobody.json.code).toBe("not-found");
    const other = await anotherSurvey(team);
    const foreign = await other.lead.call(assignVisits, {
      params: { surveyId: other.surveyId },
      body: { visitIds, memberId: null, day: "" },
    });
    expect(foreign.json.code).toBe("cell-not-drawn");
  });
});

describe("closing picks", () => {
  const close = (visitId: string, state = "refused", id: string = randomUUID(), reason = "the owner said no") =>
    team.lead.call(closePick, { params: { ...here(), visitId }, body: { id, state: state as never, reason } });

  test("closing a cell opens the next reserve, strictly in order, and its visit", async () => {
    const draw = await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    const before = await visits();
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
    const after = await visits();
    expect(visitAt(after.visits, 4)).toMatchObject({ state: "closed", count: { state: "refused", by: "Lead" } });
    expect(visitAt(after.visits, 11)).toMatchObject({ state: "in-use", openedFor: 4, unit: reserve?.unit });
    expect([after.picks, after.reservesLeft]).toEqual([10, 4]);
    expect(lastEvent()?.kind).toBe("pick-closed");
    expect(payloadOf()).toMatchObject({
      unit: target.unit,
      closed: [4],
      opened: [11],
      passedOver: [],
      state: "refused",
    });
    const read = await team.auditor.call(readDraw, { params: { ...here(), drawId: draw.id } });
    expect(read.json.entries.map((entry) => entry.state)).toEqual([
      ...["in-use", "in-use", "in-use", "closed", "in-use", "in-use", "in-use", "in-use", "in-use", "in-use"],
      ...["in-use", "reserve", "reserve", "reserve", "reserve"],
    ]);
    expect(read.json.entries[10]?.openedFor).toBe(4);
    expect(read.json.entries[3]?.count).toBe("refused");
  });

  test("a cell that was picked twice opens two reserves", async () => {
    const draw = await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wr", n: 40 }, reserves: 20 }));
    const repeat = draw.entries.find((entry) => entry.repeatOf !== null && !entry.reserve);
    const visit = (await visits()).visits.find((one) => one.unit === repeat?.unit);
    const times = visit?.orders.length ?? 0;
    expect(times).toBeGreaterThan(1);
    const { json } = await close(visit?.id ?? "");
    expect(json.closed).toEqual(visit?.orders);
    expect(json.opened).toHaveLength(times);
    expect(json.opened.map((one) => one.position)).toEqual(
      [...json.opened.map((one) => one.position)].toSorted((a, b) => a - b),
    );
    expect((await visits()).picks).toBe(40);
  });

  test("sent twice it answers the same and opens no more", async () => {
    await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    const visit = visitAt((await visits()).visits, 1);
    const id = randomUUID();
    const [first, second] = await Promise.all([close(visit.id, "unsafe", id), close(visit.id, "unsafe", id)]);
    expect(second.json).toEqual(first.json);
    expect((await visits()).reservesLeft).toBe(4);
    const other = await close(visit.id, "lost");
    expect(other.json.code).toBe("pick-not-in-use");
  });

  test("a counted cell is not closed: its count is amended", async () => {
    await drawCells(team, declaring(frame.frameId));
    const { visits: all, targetId } = await visits();
    const visit = visitAt(all, 1);
    const entry = {
      id: randomUUID(),
      visitId: visit.id,
      targetId,
      said: { state: "counted" as const, value: 0 },
      note: "",
      madeAt: "2031-05-02T07:00:00Z",
    };
    await team.lead.call(enterCounts, { params: here(), body: { entries: [entry] } });
    const refused = await close(visit.id);
    expect(refused.json.code).toBe("count-exists");
    expect((await visits()).reservesLeft).toBe(5);
  });

  test("a state that a counter brought back is kept; another one amends it", async () => {
    await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    const { visits: all, targetId } = await visits();
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
      await team.lead.call(enterCounts, { params: here(), body: { entries: [entry] } });
    }
    // What a counter says opens nothing yet.
    expect((await visits()).reservesLeft).toBe(5);
    await close(one.id, "unsafe");
    await close(two.id, "not-reached");
    const after = (await visits()).visits;
    expect(visitAt(after, 1).count).toMatchObject({ state: "unsafe", amended: false, note: "slippery" });
    expect(visitAt(after, 2).count).toMatchObject({ state: "not-reached", amended: true });
  });

  test("a pick that finds no reserve is told", async () => {
    await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 5 }, reserves: 1 }));
    const { visits: all } = await visits();
    expect((await close(visitAt(all, 1).id)).json).toMatchObject({ reservesLeft: 0, unreplaced: 0 });
    expect((await close(visitAt(all, 2).id)).json).toMatchObject({ opened: [], reservesLeft: 0, unreplaced: 1 });
    expect((await visits()).picks).toBe(4);
  });

  test("a cell of a withdrawn draw can't be closed", async () => {
    const draw = await drawCells(team, declaring(frame.frameId));
    const visit = visitAt((await visits()).visits, 1);
    await team.planner.call(withdrawDraw, {
      params: { ...here(), drawId: draw.id },
      body: { reason: "drawn too early" },
    });
    expect((await close(visit.id)).json.code).toBe("pick-not-in-use");
  });

  test("a counter can't close", async () => {
    await drawCells(team, declaring(frame.frameId));
    const visit = visitAt((await visits()).visits, 1);
    const body = { id: randomUUID(), state: "lost" as const, reason: "the sheet got wet" };
    const refused = await team.counter.call(closePick, { params: { ...here(), visitId: visit.id }, body });
    expect(refused.json.code).toBe("not-allowed");
  });

  // R6: the reserve that a closed cell opened stays when the cell is counted after all; a counted cell that is amended to
  // a closing state leaves the picks and opens none.
  test("counted after all it is in use again; amended to a closing state it leaves and opens nothing", async () => {
    await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    const first = await visits();
    const visit = visitAt(first.visits, 3);
    await close(visit.id, "lost");
    const amend = async (said: { state: "counted"; value: number } | { state: "refused" }) => {
      const now = visitAt((await visits()).visits, 3).count;
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
      return team.lead.call(amendCount, { params: { ...here(), visitId: visit.id }, body });
    };
    expect((await amend({ state: "counted", value: 7 })).json).toMatchObject({
      state: "in-use",
      count: { state: "counted", value: 7 },
    });
    expect(await visits()).toMatchObject({ picks: 11, reservesLeft: 4 });
    expect((await amend({ state: "refused" })).json).toMatchObject({ state: "closed", count: { state: "refused" } });
    expect(await visits()).toMatchObject({ picks: 10, reservesLeft: 4 });
  });
});

describe("waypoints", () => {
  const exporting = (changes: Record<string, unknown> = {}) =>
    team.lead.call(exportWaypoints, {
      params: here(),
      body: { format: "gpx", nameLength: 10, prefix: "", memberId: null, ...changes } as never,
    });
  const textOf = (reply: { bytes: Uint8Array }) => new TextDecoder().decode(reply.bytes);

  async function drawn(): Promise<DrawDetail> {
    return drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wr", n: 40 } }));
  }

  test("one waypoint a cell, and the file's hash on record", async () => {
    const draw = await drawn();
    const reply = await exporting();
    expect(reply.status).toBe(200);
    expect(reply.headers.get("content-type")).toContain("application/gpx+xml");
    expect(reply.headers.get("content-disposition")).toContain("hallow-moss-2031-draw-1.gpx");
    const text = textOf(reply);
    expect(text.match(/<wpt /g)).toHaveLength(draw.cellsToVisit);
    expect(lastEvent()?.kind).toBe("waypoints-exported");
    expect(payloadOf()).toMatchObject({
      format: "gpx",
      cells: draw.cellsToVisit,
      fileSha256: createHash("sha256").update(reply.bytes).digest("hex"),
    });
  });

  test("the file is GPX 1.1 by its published schema", async () => {
    await drawn();
    const text = textOf(await exporting({ prefix: "HM", nameLength: 14 }));
    const lint = spawnSync("xmllint", ["--noout", "--schema", "tests/reference/schemas/gpx.xsd", "-"], { input: text });
    if (lint.error === undefined) expect(lint.stderr.toString()).toContain("validates");
    expect(text).toContain("<name>HM");
  });

  test("the table has a row a cell with centre, corners, draw orders, repeats and share", async () => {
    await drawn();
    const { visits: all } = await visits();
    const reply = await exporting({ format: "csv" });
    expect(reply.headers.get("content-type")).toContain("text/csv");
    const [head, ...lines] = textOf(reply).trimEnd().split("\r\n");
    const columns = head?.split(",") ?? [];
    expect(lines).toHaveLength(all.length);
    const visit = all.find((one) => one.orders.length > 1);
    const row = lines.map((line) => line.split(",")).find((cells) => cells[1] === String(visit?.unit)) ?? [];
    const value = (name: string) => row[columns.indexOf(name)];
    expect(value("draw_orders")).toBe(visit?.orders.join(" "));
    expect(value("repeats")).toBe(String(visit?.orders.length));
    expect(value("label")).toBe(visit?.label);
    expect(value("centre_east_m")).toBe(`${visit?.centre.eastM ?? 0}.000`);
    expect(value("sw_east_m")).toBe(`${(visit?.column ?? 0) * 20}.000`);
    expect(value("ne_north_m")).toBe(`${((visit?.row ?? 0) + 1) * 20}.000`);
    expect(value("centre_longitude")).toBe(visit?.centre.lng.toFixed(7));
    expect(Number(value("nw_latitude"))).toBeGreaterThan(Number(value("sw_latitude")));
    expect(value("share_inside")).toBe(((visit?.shareBillionths ?? 0) / 1e9).toFixed(9));
  });

  test("names that clash after cutting are refused with what to change; by draw order they fit", async () => {
    await drawn();
    const clash = await exporting({ nameLength: 4, prefix: "ABC" });
    expect(clash.json.code).toBe("names-clash");
    expect(clash.json.detail).toMatch(/would stand for .*,/);
    const fits = await exporting({ nameLength: 4, prefix: "A", scheme: "order" });
    expect(fits.status).toBe(200);
  });

  test("a counter exports their own cells only, and closed cells are left out", async () => {
    await drawn();
    const { visits: all } = await visits();
    const counter = await memberWith("counter");
    const own = { format: "csv" as const, nameLength: 10, prefix: "", memberId: null };
    const none = await team.counter.call(exportWaypoints, { params: here(), body: own });
    expect(none.json.code).toBe("nothing-to-export");
    const ids = all.slice(0, 2).map((visit) => visit.id);
    await team.lead.call(assignVisits, { params: here(), body: { visitIds: ids, memberId: counter, day: "" } });
    const two = await team.counter.call(exportWaypoints, { params: here(), body: own });
    expect(textOf(two).trimEnd().split("\r\n")).toHaveLength(3);
    const theirs = await team.counter.call(exportWaypoints, {
      params: here(),
      body: { ...own, memberId: await memberWith("lead") },
    });
    expect(theirs.json.code).toBe("not-allowed");
    const body = { id: randomUUID(), state: "refused" as const, reason: "the owner said no" };
    await team.lead.call(closePick, { params: { ...here(), visitId: ids[0] ?? "" }, body });
    const one = await team.counter.call(exportWaypoints, { params: here(), body: own });
    expect(textOf(one).trimEnd().split("\r\n")).toHaveLength(2);
  });

  test("before a draw there is nothing to export", async () => {
    expect((await exporting()).json.code).toBe("draw-missing");
  });
});
