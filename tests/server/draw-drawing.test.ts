import { createHash } from "node:crypto";
import { describe, expect, test } from "vitest";
import { declareDraw, listDraws, makeDraw, readDraw, readRecipe } from "#shared/api/draw.ts";
import { listVisits } from "#shared/api/field.ts";
import { allEvents } from "#server/db/events.ts";
import { declaring, drawCells } from "../fixtures/sealed-frame.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";

const survey = surveyEachTest();
const SEED = "07391522864013975605";

/** Rule R6 by hand: SHA-256 of "quillet-draw/1|frame|seed|stratum|k" as a big-endian number, modulo N, plus 1. */
function unitByHand(frameSha256: string, units: number, seed: string, k: number): number {
  const hex = createHash("sha256").update(`quillet-draw/1|${frameSha256}|${seed}||${k}`, "utf8").digest("hex");
  return Number(BigInt(`0x${hex}`) % BigInt(units)) + 1;
}

describe("drawing", () => {
  test("entries are those of the hash by hand, repeats are named, and each cell is visited once", async () => {
    const wanted = declaring(survey.frame.frameId, { design: { kind: "srs-wr", n: 40 }, reserves: 8 });
    const draw = await drawCells(survey.team, wanted, SEED);
    const byHand = Array.from({ length: 48 }, (_, i) => unitByHand(survey.frame.frameSha256, 70, SEED, i + 1));
    expect(draw.entries.map((entry) => entry.unit)).toEqual(byHand);
    expect(draw.entries.filter((entry) => entry.reserve).map((entry) => entry.position)).toEqual([
      41, 42, 43, 44, 45, 46, 47, 48,
    ]);
    for (const entry of draw.entries) {
      const first = byHand.indexOf(entry.unit) + 1;
      expect(entry.repeatOf).toBe(first === entry.position ? null : first);
      expect(entry.state).toBe(entry.reserve ? "reserve" : "in-use");
      expect(entry.count).toBe("not-visited");
    }
    const distinct = new Set(byHand.slice(0, 40));
    expect(draw).toMatchObject({ number: 1, state: "live", picks: 40, cellsToVisit: distinct.size, reserves: 8 });
    const visits = await survey.team.planner.call(listVisits, { params: survey.here() });
    expect(visits.json.visits).toHaveLength(distinct.size);
    expect(new Set(visits.json.visits.map((visit) => visit.unit))).toEqual(distinct);
  });

  test("without replacement no cell comes twice", async () => {
    const draw = await drawCells(
      survey.team,
      declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 60 }, reserves: 10 }),
    );
    const units = draw.entries.map((entry) => entry.unit);
    expect(new Set(units).size).toBe(70);
    expect(units.toSorted((a, b) => a - b)).toEqual(Array.from({ length: 70 }, (_, i) => i + 1));
  });

  test("sealed, declared, seed and draw stand on record in this order", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId));
    expect(survey.kinds().slice(-4)).toEqual(["frame-sealed", "draw-declared", "seed-given", "draw-made"]);
    const made = allEvents(survey.server.platform.db, survey.team.surveyId).at(-1);
    const lines = Array.from(
      { length: 15 },
      (_, i) => `,${i + 1},${unitByHand(survey.frame.frameSha256, 70, SEED, i + 1)}\n`,
    );
    expect(JSON.parse(made?.payload ?? "")).toMatchObject({
      picks: 10,
      reserves: 5,
      entriesSha256: createHash("sha256").update(lines.join("")).digest("hex"),
    });
  });
});

describe("the seed and the second click", () => {
  // Seed and frame together tell every drawn cell: whoever may see only their own cells would see all.
  test("a counter is not told the seed; an auditor is", async () => {
    const draw = await drawCells(survey.team, declaring(survey.frame.frameId), SEED);
    const params = { ...survey.here(), drawId: draw.id };
    const { counter, auditor } = survey.team;
    const listed = await counter.call(listDraws, { params: survey.here() });
    const read = await counter.call(readDraw, { params });
    expect([listed.status, read.status]).toEqual([200, 200]);
    expect(listed.json.declarations[0]).toMatchObject({ state: "drawn", seed: null });
    expect(read.json.declaration).toMatchObject({ state: "drawn", seed: null });
    expect(JSON.stringify([listed.json, read.json])).not.toContain(SEED);
    expect((await auditor.call(readDraw, { params })).json.declaration.seed?.text).toBe(SEED);
    expect((await auditor.call(listDraws, { params: survey.here() })).json.declarations[0]?.seed?.text).toBe(SEED);
  });

  test("a seed made here has twenty digits; a seed sent with it is refused", async () => {
    const body = declaring(survey.frame.frameId, { seedSource: "made-here" });
    const { json } = await survey.team.planner.call(declareDraw, { params: survey.here(), body });
    const params = { ...survey.here(), declarationId: json.id };
    expect((await survey.team.planner.call(makeDraw, { params, body: { seed: "42" } })).json.code).toBe("seed-invalid");
    const draw = await survey.team.planner.call(makeDraw, { params, body: {} });
    expect(draw.json.declaration.seed?.text).toMatch(/^\d{20}$/);
  });

  test("a typed seed is needed, and one with an invisible character is refused by its place", async () => {
    const { json } = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId),
    });
    const params = { ...survey.here(), declarationId: json.id };
    expect((await survey.team.planner.call(makeDraw, { params, body: {} })).json.code).toBe("seed-invalid");
    const hidden = await survey.team.planner.call(makeDraw, { params, body: { seed: "12\u200b34" } });
    expect(hidden.json.code).toBe("seed-invalid");
    expect(hidden.json.detail).toContain("Character 3");
    expect(survey.kinds().at(-1)).toBe("draw-declared");
  });

  test("a second click gets the draw that is there; another seed for it is refused", async () => {
    const { json } = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId),
    });
    const params = { ...survey.here(), declarationId: json.id };
    const clicks = await Promise.all(
      [1, 2, 3].map(() => survey.team.planner.call(makeDraw, { params, body: { seed: SEED } })),
    );
    expect(clicks.map((click) => click.status)).toEqual([200, 200, 200]);
    expect(new Set(clicks.map((click) => click.json.id)).size).toBe(1);
    expect(survey.kinds().filter((kind) => kind === "draw-made" || kind === "seed-given")).toHaveLength(2);
    const other = await survey.team.planner.call(makeDraw, { params, body: { seed: "another" } });
    expect(other.json.code).toBe("declaration-closed");
  });

  test("a long list is drawn in a worker and is the same by hand", async () => {
    const draw = await drawCells(
      survey.team,
      declaring(survey.frame.frameId, { design: { kind: "srs-wr", n: 2500 }, reserves: 0 }),
    );
    expect(draw.entries).toHaveLength(2500);
    for (const k of [1, 1000, 2500]) {
      expect(draw.entries[k - 1]?.unit).toBe(unitByHand(survey.frame.frameSha256, 70, SEED, k));
    }
  }, 20_000);

  test("while a draw is live another can't be declared", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId));
    const more = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId),
    });
    expect(more.json.code).toBe("draw-live");
  });

  test("the recipe quotes the text that was hashed", async () => {
    const draw = await drawCells(survey.team, declaring(survey.frame.frameId));
    const { json } = await survey.team.auditor.call(readRecipe, { params: { ...survey.here(), drawId: draw.id } });
    expect(json.shell).toContain(`quillet-draw/1|${survey.frame.frameSha256}|${SEED}||`);
    expect(json.python).toContain("UNITS = 70");
  });
});
