import { randomUUID } from "node:crypto";
import { describe, expect, test } from "vitest";
import { amendCount } from "#shared/api/counts.ts";
import { readEstimate } from "#shared/api/estimate.ts";
import { closePick, listVisits } from "#shared/api/field.ts";
import { declaring, drawCells } from "../fixtures/sealed-frame.ts";
import { countCells } from "../fixtures/count-cells.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";

const survey = surveyEachTest();

const read = (client = survey.team.auditor) => client.call(readEstimate, { params: survey.here() });

const sum = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0);

describe("the estimate", () => {
  test("without a draw or a count there is none, and it says what to do", async () => {
    expect((await read()).json.code).toBe("draw-missing");
    await drawCells(survey.team, declaring(survey.frame.frameId));
    expect((await read()).json.code).toBe("estimate-impossible");
  });

  // By hand: ȳ over the 12 picks, repeats as often as they were picked; T = 70·ȳ; SE(T) = 70·√(s²/12), no finite population
  // correction; t with 11 degrees of freedom is 2.200985 (table); density = T / 2.5 ha, the area spoken for under clip.
  test("with replacement a repeat enters as often as it was picked; density is over the area spoken for", async () => {
    const draw = await drawCells(
      survey.team,
      declaring(survey.frame.frameId, { design: { kind: "srs-wr", n: 12 }, reserves: 3 }),
      "4",
    );
    const picks = draw.entries.filter((entry) => !entry.reserve);
    expect(draw.cellsToVisit).toBeLessThan(12);
    await countCells(survey, (unit) => unit % 7);
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
      frame: { number: 1, sha256: survey.frame.frameSha256, cellWidthM: 20, crsName: "WGS 84 / UTM zone 32N" },
      draw: { number: 1 },
      declaration: { limits: "log-normal", level: "0.95" },
      chosenAfterCounts: [],
    });
  });

  // Without replacement: SE(T) = 70·√((1 − 10/70)·s²/10).
  test("without replacement the finite population correction is applied", async () => {
    const draw = await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
    await countCells(survey, (unit) => unit % 5);
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
    await survey.begin({ countIn: "whole" });
    await drawCells(survey.team, declaring(survey.frame.frameId));
    await countCells(survey, (unit) => unit % 3);
    const { density } = (await read()).json.result;
    expect(density.kind === "known" && density.areaM2).toBe(70 * 400);
  });
});

describe("picks without a count", () => {
  test("a refused cell that was closed is named, its reserve stands in, and nothing is taken for zero", async () => {
    const draw = await drawCells(
      survey.team,
      declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 5 }, reserves: 2 }),
    );
    const third = draw.entries[2];
    const body = { id: randomUUID(), state: "refused" as const, reason: "the owner said no" };
    await survey.team.lead.call(closePick, { params: { ...survey.here(), visitId: third?.visitId ?? "" }, body });
    await countCells(survey, (unit) => unit % 4);
    const { result } = (await read()).json;
    expect(result.picksCounted).toBe(5);
    const used = [0, 1, 3, 4, 5].map((place) => (draw.entries[place]?.unit ?? 0) % 4);
    expect(result.mean.estimate).toBeCloseTo(sum(used) / 5, 12);
    expect(result.missing).toEqual([
      { order: 3, unit: third?.unit, label: third?.label, state: "refused", closed: true },
    ]);
  });

  test("a count amended to refused is shown both ways", async () => {
    const draw = await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 5 } }));
    await countCells(survey, () => 4);
    const { visits, targetId } = (await survey.team.lead.call(listVisits, { params: survey.here() })).json;
    const visit = visits.find((one) => one.unit === draw.entries[0]?.unit);
    const replaces = visit?.count.state === "counted" ? visit.count.entryId : "";
    await survey.team.lead.call(amendCount, {
      params: { ...survey.here(), visitId: visit?.id ?? "" },
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
});
