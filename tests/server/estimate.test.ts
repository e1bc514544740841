import { createHash, randomUUID } from "node:crypto";
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { amendCount, enterCounts } from "#shared/api/counts.ts";
import { type DrawDetail, withdrawDraw } from "#shared/api/draw.ts";
import { exportEstimate, keepEstimate, listKeptEstimates, readEstimate } from "#shared/api/estimate.ts";
import { closePick, listVisits } from "#shared/api/field.ts";
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
}, 30_000);

const here = () => ({ surveyId: team.surveyId });
const read = (client = team.auditor) => client.call(readEstimate, { params: here() });
const textOf = (reply: { bytes: Uint8Array }) => new TextDecoder().decode(reply.bytes);

/** Counts each cell to visit by its unit. */
async function count(valueOf: (unit: number) => number | "refused", units?: ReadonlySet<number>): Promise<void> {
  const { visits, targetId } = (await team.lead.call(listVisits, { params: here() })).json;
  const entries = visits
    .filter((visit) => visit.count.state === "not-visited" && (units?.has(visit.unit) ?? true))
    .map((visit) => {
      const value = valueOf(visit.unit);
      const said = value === "refused" ? { state: value } : { state: "counted" as const, value };
      return {
        id: randomUUID() as string,
        visitId: visit.id,
        targetId,
        said,
        note: "",
        madeAt: "2031-05-02T07:00:00Z",
      };
    });
  const reply = await team.lead.call(enterCounts, { params: here(), body: { entries } });
  if (reply.status !== 200) throw new Error(reply.json.detail);
}

const sum = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0);

describe("the estimate", () => {
  test("without a draw or a count there is none, and it says what to do", async () => {
    expect((await read()).json.code).toBe("draw-missing");
    await drawCells(team, declaring(frame.frameId));
    expect((await read()).json.code).toBe("estimate-impossible");
  });

  // By hand: ȳ over the 12 picks, repeats as often as they were picked; T = 70·ȳ; SE(T) = 70·√(s²/12), no finite population
  // correction; t with 11 degrees of freedom is 2.200985 (table); density = T / 2.5 ha, the area spoken for under clip.
  test("with replacement a repeat enters as often as it was picked; density is over the area spoken for", async () => {
    const draw = await drawCells(
      team,
      declaring(frame.frameId, { design: { kind: "srs-wr", n: 12 }, reserves: 3 }),
      "4",
    );
    const picks = draw.entries.filter((entry) => !entry.reserve);
    expect(draw.cellsToVisit).toBeLessThan(12);
    await count((unit) => unit % 7);
    const values = picks.map((pick) => pick.unit % 7);
    const mean = sum(values) / 12;
    const variance = sum(values.map((value) => (value - mean) ** 2)) / 11;
    const error = 70 * Math.sqrt(variance / 12);
    const { json } = await read();
    const { result, context } = json;
    expect(result).toMatchObject({ units: 70, picksInUse: 12, picksCounted: 12, distinctCells: draw.cellsToVisit });
    expect(result.mean.estimate).toBeCloseTo(mean, 12);
    expect(result.total.estimate).toBeCloseTo(70 * mean, 9);
    const { standardError, limits } = result.total;
    expect(standardError.kind === "known" && standardError.value).toBeCloseTo(error, 9);
    expect(limits.t.kind === "interval" && limits.t.lower).toBeCloseTo(70 * mean - 2.200985 * error, 3);
    expect(limits.t.kind === "interval" && limits.t.upper).toBeCloseTo(70 * mean + 2.200985 * error, 3);
    const density = result.density;
    expect(density.kind === "known" && density.areaM2).toBe(25_000);
    expect(density.kind === "known" && density.estimate).toBeCloseTo((70 * mean) / 2.5, 9);
    expect(context).toMatchObject({
      frame: { number: 1, sha256: frame.frameSha256, cellWidthM: 20, crsName: "WGS 84 / UTM zone 32N" },
      draw: { number: 1 },
      declaration: { limits: "log-normal", level: "0.95" },
      chosenAfterCounts: [],
    });
  });

  // Without replacement: SE(T) = 70·√((1 − 10/70)·s²/10).
  test("without replacement the finite population correction is applied", async () => {
    const draw = await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    await count((unit) => unit % 5);
    const values = draw.entries.slice(0, 10).map((pick) => pick.unit % 5);
    const mean = sum(values) / 10;
    const variance = sum(values.map((value) => (value - mean) ** 2)) / 9;
    const { standardError } = (await read()).json.result.total;
    expect(standardError.kind === "known" && standardError.value).toBeCloseTo(
      70 * Math.sqrt(((1 - 10 / 70) * variance) / 10),
      9,
    );
  });

  test("whole cells: density is over N times a cell's area", async () => {
    team = await anotherSurvey(team);
    frame = putSealedFrame(server, team.surveyId, { countIn: "whole" });
    await drawCells(team, declaring(frame.frameId));
    await count((unit) => unit % 3);
    const { density } = (await read()).json.result;
    expect(density.kind === "known" && density.areaM2).toBe(70 * 400);
  });

  test("a refused cell that was closed is named, its reserve stands in, and nothing is taken for zero", async () => {
    const draw = await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 5 }, reserves: 2 }));
    const third = draw.entries[2];
    const body = { id: randomUUID(), state: "refused" as const, reason: "the owner said no" };
    await team.lead.call(closePick, { params: { ...here(), visitId: third?.visitId ?? "" }, body });
    await count((unit) => unit % 4);
    const { result } = (await read()).json;
    expect(result.picksCounted).toBe(5);
    const used = [0, 1, 3, 4, 5].map((place) => (draw.entries[place]?.unit ?? 0) % 4);
    expect(result.mean.estimate).toBeCloseTo(sum(used) / 5, 12);
    expect(result.missing).toEqual([
      { order: 3, unit: third?.unit, label: third?.label, state: "refused", closed: true },
    ]);
  });

  test("a count amended to refused is shown both ways", async () => {
    const draw = await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 5 } }));
    await count(() => 4);
    const { visits, targetId } = (await team.lead.call(listVisits, { params: here() })).json;
    const visit = visits.find((one) => one.unit === draw.entries[0]?.unit);
    const replaces = visit?.count.state === "counted" ? visit.count.entryId : "";
    await team.lead.call(amendCount, {
      params: { ...here(), visitId: visit?.id ?? "" },
      body: {
        id: randomUUID(),
        targetId,
        replaces,
        said: { state: "refused" },
        note: "",
        reason: "counted without leave",
        madeAt: "2031-05-02T07:00:00Z",
      },
    });
    const { result } = (await read()).json;
    expect(result).toMatchObject({
      picksCounted: 4,
      withAmendedAsCounted: { kind: "amended", picks: 1, total: 280, mean: 4 },
    });
  });

  test("limits declared after the first count are labelled so", async () => {
    const first = await drawCells(team, declaring(frame.frameId));
    await count((unit) => unit % 3);
    await team.planner.call(withdrawDraw, {
      params: { ...here(), drawId: first.id },
      body: { reason: "too few cells" },
    });
    server.setNow("2031-05-03T08:00:00.000Z");
    await drawCells(team, declaring(frame.frameId, { limits: "t" }), "another");
    await count((unit) => unit % 3);
    const { context, methods } = (await read()).json;
    expect(context.chosenAfterCounts).toEqual(["limits", "level"]);
    expect(methods).toContain("chosen after counts were seen");
    expect(methods).toContain("1 other draw");
    server.setNow("2031-05-02T08:00:00.000Z");
  });

  test("the methods statement names frame hash, seed and who chose it", async () => {
    await drawCells(team, declaring(frame.frameId), "4711 at noon");
    await count((unit) => unit % 3);
    const { methods } = (await read()).json;
    expect(methods).toContain(frame.frameSha256);
    expect(methods).toContain("`4711 at noon` was chosen by Planner; nothing shows that only one was tried");
  });
});

describe("keeping", () => {
  let draw: DrawDetail;
  beforeEach(async () => {
    draw = await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 6 } }));
    await count((unit) => unit % 3, new Set(draw.entries.slice(0, 5).map((entry) => entry.unit)));
  }, 30_000);

  test("what was seen is put on record with its hash", async () => {
    const seen = (await read(team.lead)).json;
    const { json } = await team.lead.call(keepEstimate, { params: here(), body: { resultSha256: seen.resultSha256 } });
    expect(json).toMatchObject({ keptBy: "Lead", resultSha256: seen.resultSha256 });
    expect(json.result).toEqual(seen.result);
    const event = allEvents(server.platform.db, team.surveyId).at(-1);
    expect(event?.kind).toBe("estimate-kept");
    expect(JSON.parse(event?.payload ?? "")).toMatchObject({ estimateId: json.id, resultSha256: seen.resultSha256 });
    // RFC 8785 by hand: members sorted, numbers as JavaScript writes them.
    expect(createHash("sha256").update(sorted(seen.result)).digest("hex")).toBe(seen.resultSha256);
    const listed = await team.auditor.call(listKeptEstimates, { params: here() });
    expect(listed.json.estimates.map((one) => one.id)).toEqual([json.id]);
  });

  test("after another count what was seen is not kept", async () => {
    const seen = (await read(team.lead)).json.resultSha256;
    await count(() => 9);
    const refused = await team.lead.call(keepEstimate, { params: here(), body: { resultSha256: seen } });
    expect(refused.json.code).toBe("changed-meanwhile");
    expect((await team.auditor.call(keepEstimate, { params: here(), body: { resultSha256: seen } })).json.code).toBe(
      "not-allowed",
    );
  });

  test("the picks as CSV have an empty cell where there is no count, and the figures are those of the page", async () => {
    const picks = await team.auditor.call(exportEstimate, { params: here() });
    expect(picks.headers.get("content-disposition")).toContain("hallow-moss-2031-estimate-picks.csv");
    const [head, ...rows] = textOf(picks).trimEnd().split("\r\n");
    expect(head).toBe("pick,unit,label,column,row,use,repeat_of,state,count,counted_at,note");
    const six = rows.map((row) => row.split(","));
    expect(six.map((cells) => [cells[0], cells[1], cells[7], cells[8]])).toEqual(
      draw.entries
        .slice(0, 6)
        .map(({ position, unit }) =>
          position === 6
            ? [String(position), String(unit), "not-visited", ""]
            : [String(position), String(unit), "counted", String(unit % 3)],
        ),
    );
    const figures = await team.auditor.call(exportEstimate, { params: here(), query: { table: "figures" } });
    const total = textOf(figures).split("\r\n")[1]?.split(",");
    const { result } = (await read()).json;
    expect(Number(total?.[1])).toBe(result.total.estimate);
    const lower = result.total.limits.logNormal;
    expect(Number(total?.[5])).toBe(lower.kind === "interval" ? lower.lower : Number.NaN);
  });

  test("a counter sees no estimate", async () => {
    expect((await read(team.counter)).json.code).toBe("not-allowed");
  });
});

/** JSON with the members of every object in the order of their names. */
function sorted(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(sorted).join(",")}]`;
  if (typeof value !== "object" || value === null) return JSON.stringify(value);
  const members = Object.entries(value).toSorted(([a], [b]) => (a < b ? -1 : 1));
  return `{${members.map(([name, of]) => `${JSON.stringify(name)}:${sorted(of)}`).join(",")}}`;
}
