import { createHash } from "node:crypto";
import { beforeEach, describe, expect, test } from "vitest";
import { type DrawDetail, withdrawDraw } from "#shared/api/draw.ts";
import { exportEstimate, keepEstimate, listKeptEstimates, readEstimate } from "#shared/api/estimate.ts";
import { allEvents } from "#server/db/events.ts";
import { declaring, drawCells } from "../fixtures/sealed-frame.ts";
import { countCells } from "../fixtures/count-cells.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";

const survey = surveyEachTest();

const read = (client = survey.team.auditor) => client.call(readEstimate, { params: survey.here() });
const textOf = (reply: { bytes: Uint8Array }) => new TextDecoder().decode(reply.bytes);

describe("what the statement says", () => {
  test("limits declared after the first count are labelled so", async () => {
    const first = await drawCells(survey.team, declaring(survey.frame.frameId));
    await countCells(survey, (unit) => unit % 3);
    await survey.team.planner.call(withdrawDraw, {
      params: { ...survey.here(), drawId: first.id },
      body: { reason: "too few cells" },
    });
    survey.server.setNow("2031-05-03T08:00:00.000Z");
    await drawCells(survey.team, declaring(survey.frame.frameId, { limits: "t" }), "another");
    await countCells(survey, (unit) => unit % 3);
    const { context, methods } = (await read()).json;
    expect(context.chosenAfterCounts).toEqual(["limits", "level"]);
    expect(methods).toContain("chosen after counts were seen");
    expect(methods).toContain("1 other draw");
    survey.server.setNow("2031-05-02T08:00:00.000Z");
  });

  test("the methods statement names frame hash, seed and who chose it", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId), "4711 at noon");
    await countCells(survey, (unit) => unit % 3);
    const { methods } = (await read()).json;
    expect(methods).toContain(survey.frame.frameSha256);
    expect(methods).toContain("`4711 at noon` was chosen by Planner; nothing shows that only one was tried");
  });
});

describe("keeping", () => {
  let draw: DrawDetail;
  beforeEach(async () => {
    draw = await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 6 } }));
    await countCells(survey, (unit) => unit % 3, new Set(draw.entries.slice(0, 5).map((entry) => entry.unit)));
  }, 30_000);

  test("what was seen is put on record with its hash", async () => {
    const seen = (await read(survey.team.lead)).json;
    const { json } = await survey.team.lead.call(keepEstimate, {
      params: survey.here(),
      body: { resultSha256: seen.resultSha256 },
    });
    expect(json).toMatchObject({ keptBy: "Lead", resultSha256: seen.resultSha256 });
    expect(json.result).toEqual(seen.result);
    const event = allEvents(survey.server.platform.db, survey.team.surveyId).at(-1);
    expect(event?.kind).toBe("estimate-kept");
    expect(JSON.parse(event?.payload ?? "")).toMatchObject({ estimateId: json.id, resultSha256: seen.resultSha256 });
    // RFC 8785 by hand: members sorted, numbers as JavaScript writes them.
    expect(createHash("sha256").update(sorted(seen.result)).digest("hex")).toBe(seen.resultSha256);
    const listed = await survey.team.auditor.call(listKeptEstimates, { params: survey.here() });
    expect(listed.json.estimates.map((one) => one.id)).toEqual([json.id]);
  });

  test("after another count what was seen is not kept", async () => {
    const seen = (await read(survey.team.lead)).json.resultSha256;
    await countCells(survey, () => 9);
    const refused = await survey.team.lead.call(keepEstimate, { params: survey.here(), body: { resultSha256: seen } });
    expect(refused.json.code).toBe("changed-meanwhile");
    expect(
      (await survey.team.auditor.call(keepEstimate, { params: survey.here(), body: { resultSha256: seen } })).json.code,
    ).toBe("not-allowed");
  });

  test("the picks as CSV have an empty cell where there is no count, and the figures are those of the page", async () => {
    const picks = await survey.team.auditor.call(exportEstimate, { params: survey.here() });
    expect(picks.headers.get("content-disposition")).toContain("hallow-moss-2031-estimate-picks.csv");
    const [head, ...rows] = textOf(picks).trimEnd().split("\r\n");
    expect(head).toBe(
      "pick,unit,label,column,row,use,repeat_of,state,count,counted_at,note,record_event,record_sha256",
    );
    const six = rows.map((row) => row.split(","));
    const { newest } = (await read()).json.context;
    expect(six[0]?.slice(-2)).toEqual([String(newest.sequence), newest.sha256]);
    expect(six.map((cells) => [cells[0], cells[1], cells[7], cells[8]])).toEqual(
      draw.entries
        .slice(0, 6)
        .map(({ position, unit }) =>
          position === 6
            ? [String(position), String(unit), "not-visited", ""]
            : [String(position), String(unit), "counted", String(unit % 3)],
        ),
    );
    const figures = await survey.team.auditor.call(exportEstimate, {
      params: survey.here(),
      query: { table: "figures" },
    });
    const total = textOf(figures).split("\r\n")[1]?.split(",");
    const { result } = (await read()).json;
    expect(Number(total?.[1])).toBe(result.total.estimate);
    const lower = result.total.limits.logNormal;
    expect(Number(total?.[5])).toBe(lower.kind === "interval" ? lower.lower : Number.NaN);
  });

  test("a counter sees no estimate", async () => {
    expect((await read(survey.team.counter)).json.code).toBe("not-allowed");
  });
});

/** JSON with the members of every object in the order of their names. */
function sorted(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(sorted).join(",")}]`;
  if (typeof value !== "object" || value === null) return JSON.stringify(value);
  const members = Object.entries(value).toSorted(([a], [b]) => (a < b ? -1 : 1));
  return `{${members.map(([name, of]) => `${JSON.stringify(name)}:${sorted(of)}`).join(",")}}`;
}
