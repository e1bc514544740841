import { createHash } from "node:crypto";
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import {
  abandonDeclaration,
  declareDraw,
  listDraws,
  makeDraw,
  readDraw,
  readRecipe,
  withdrawDraw,
} from "#shared/api/draw.ts";
import { assignVisits, exportWaypoints, listVisits } from "#shared/api/field.ts";
import { listMembers } from "#shared/api/surveys.ts";
import { allEvents } from "#server/db/events.ts";
import { anotherSurvey, declaring, drawCells, putSealedFrame, type SealedFrame } from "../fixtures/sealed-frame.ts";
import { startTeam, startTestServer, type Team, type TestServer } from "../fixtures/server.ts";

const SEED = "07391522864013975605";
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
const kinds = () => allEvents(server.platform.db, team.surveyId).map((event) => event.kind);

/** Rule R6 by hand: SHA-256 of "quillet-draw/1|frame|seed|stratum|k" as a big-endian number, modulo N, plus 1. */
function unitByHand(frameSha256: string, units: number, seed: string, k: number): number {
  const hex = createHash("sha256").update(`quillet-draw/1|${frameSha256}|${seed}||${k}`, "utf8").digest("hex");
  return Number(BigInt(`0x${hex}`) % BigInt(units)) + 1;
}

describe("declaring", () => {
  test("a declaration is hashed and on record before any seed exists", async () => {
    const { status, json } = await team.planner.call(declareDraw, { params: here(), body: declaring(frame.frameId) });
    expect(status).toBe(200);
    expect(json).toMatchObject({ state: "open", seed: null, units: 70, frameSha256: frame.frameSha256, frameNumber: 1 });
    expect(kinds().at(-1)).toBe("draw-declared");
    expect(JSON.parse(allEvents(server.platform.db, team.surveyId).at(-1)?.payload ?? "")).toMatchObject({
      declarationSha256: json.sha256,
    });
  });

  test("a second declaration waits until the first is drawn or abandoned", async () => {
    const first = await team.planner.call(declareDraw, { params: here(), body: declaring(frame.frameId) });
    const second = await team.planner.call(declareDraw, { params: here(), body: declaring(frame.frameId) });
    expect(second.json.code).toBe("declaration-open");
    const params = { ...here(), declarationId: first.json.id };
    await team.planner.call(abandonDeclaration, { params, body: { reason: "wrong number of picks" } });
    const third = await team.planner.call(declareDraw, { params: here(), body: declaring(frame.frameId) });
    expect(third.status).toBe(200);
  });

  test("an abandoned declaration stays on record with its reason and can't be drawn or abandoned again", async () => {
    const { json } = await team.planner.call(declareDraw, { params: here(), body: declaring(frame.frameId) });
    const params = { ...here(), declarationId: json.id };
    const ended = await team.planner.call(abandonDeclaration, { params, body: { reason: "the bog is flooded" } });
    expect(ended.json).toMatchObject({ state: "abandoned", abandoned: { reason: "the bog is flooded" } });
    expect((await team.planner.call(makeDraw, { params, body: { seed: SEED } })).json.code).toBe("declaration-closed");
    const again = await team.planner.call(abandonDeclaration, { params, body: { reason: "once more" } });
    expect(again.json.code).toBe("declaration-closed");
  });

  test("a frame that is not sealed, or is another survey's, is refused", async () => {
    const draft = putSealedFrame(server, team.surveyId, { number: 2, draft: true });
    const unsealed = await team.planner.call(declareDraw, { params: here(), body: declaring(draft.frameId) });
    expect(unsealed.json.code).toBe("frame-not-sealed");
    const other = await anotherSurvey(team);
    const theirs = putSealedFrame(server, other.surveyId);
    const foreign = await team.planner.call(declareDraw, { params: here(), body: declaring(theirs.frameId) });
    expect(foreign.json.code).toBe("not-found");
  });

  // 66 picks + 5 reserves = 71 different cells of 70.
  test("without replacement more picks and reserves than cells are refused", async () => {
    const body = declaring(frame.frameId, { design: { kind: "srs-wor", n: 66 } });
    expect((await team.planner.call(declareDraw, { params: here(), body })).json.code).toBe("design-invalid");
    const fits = declaring(frame.frameId, { design: { kind: "srs-wor", n: 65 } });
    expect((await team.planner.call(declareDraw, { params: here(), body: fits })).status).toBe(200);
  });

  test("a level at which no limits can be computed and a note that is too long are refused by name", async () => {
    const level = await team.planner.call(declareDraw, {
      params: here(),
      body: declaring(frame.frameId, { level: "0.3" }),
    });
    expect(level.json).toMatchObject({ code: "input-invalid" });
    expect(level.json.detail).toContain("0.3");
    const note = await team.planner.call(declareDraw, {
      params: here(),
      body: declaring(frame.frameId, { note: "x".repeat(3000) }),
    });
    expect(note.json.detail).toMatch(/^note/);
  });
});

describe("drawing", () => {
  test("entries are those of the hash by hand, repeats are named, and each cell is visited once", async () => {
    const wanted = declaring(frame.frameId, { design: { kind: "srs-wr", n: 40 }, reserves: 8 });
    const draw = await drawCells(team, wanted, SEED);
    const byHand = Array.from({ length: 48 }, (_, i) => unitByHand(frame.frameSha256, 70, SEED, i + 1));
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
    const visits = await team.planner.call(listVisits, { params: here() });
    expect(visits.json.visits).toHaveLength(distinct.size);
    expect(new Set(visits.json.visits.map((visit) => visit.unit))).toEqual(distinct);
  });

  test("without replacement no cell comes twice", async () => {
    const draw = await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wor", n: 60 }, reserves: 10 }));
    const units = draw.entries.map((entry) => entry.unit);
    expect(new Set(units).size).toBe(70);
    expect(units.toSorted((a, b) => a - b)).toEqual(Array.from({ length: 70 }, (_, i) => i + 1));
  });

  test("sealed, declared, seed and draw stand on record in this order", async () => {
    await drawCells(team, declaring(frame.frameId));
    expect(kinds().slice(-4)).toEqual(["frame-sealed", "draw-declared", "seed-given", "draw-made"]);
    const made = allEvents(server.platform.db, team.surveyId).at(-1);
    const lines = Array.from({ length: 15 }, (_, i) => `,${i + 1},${unitByHand(frame.frameSha256, 70, SEED, i + 1)}\n`);
    expect(JSON.parse(made?.payload ?? "")).toMatchObject({
      picks: 10,
      reserves: 5,
      entriesSha256: createHash("sha256").update(lines.join("")).digest("hex"),
    });
  });

  test("a seed made here has twenty digits; a seed sent with it is refused", async () => {
    const body = declaring(frame.frameId, { seedSource: "made-here" });
    const { json } = await team.planner.call(declareDraw, { params: here(), body });
    const params = { ...here(), declarationId: json.id };
    expect((await team.planner.call(makeDraw, { params, body: { seed: "42" } })).json.code).toBe("seed-invalid");
    const draw = await team.planner.call(makeDraw, { params, body: {} });
    expect(draw.json.declaration.seed?.text).toMatch(/^\d{20}$/);
  });

  test("a typed seed is needed, and one with an invisible character is refused by its place", async () => {
    const { json } = await team.planner.call(declareDraw, { params: here(), body: declaring(frame.frameId) });
    const params = { ...here(), declarationId: json.id };
    expect((await team.planner.call(makeDraw, { params, body: {} })).json.code).toBe("seed-invalid");
    const hidden = await team.planner.call(makeDraw, { params, body: { seed: "12\u200b34" } });
    expect(hidden.json.code).toBe("seed-invalid");
    expect(hidden.json.detail).toContain("Character 3");
    expect(kinds().at(-1)).toBe("draw-declared");
  });

  test("a second click gets the draw that is there; another seed for it is refused", async () => {
    const { json } = await team.planner.call(declareDraw, { params: here(), body: declaring(frame.frameId) });
    const params = { ...here(), declarationId: json.id };
    const clicks = await Promise.all(
      [1, 2, 3].map(() => team.planner.call(makeDraw, { params, body: { seed: SEED } })),
    );
    expect(clicks.map((click) => click.status)).toEqual([200, 200, 200]);
    expect(new Set(clicks.map((click) => click.json.id)).size).toBe(1);
    expect(kinds().filter((kind) => kind === "draw-made" || kind === "seed-given")).toHaveLength(2);
    const other = await team.planner.call(makeDraw, { params, body: { seed: "another" } });
    expect(other.json.code).toBe("declaration-closed");
  });

  test("a long list is drawn in a worker and is the same by hand", async () => {
    const draw = await drawCells(team, declaring(frame.frameId, { design: { kind: "srs-wr", n: 2500 }, reserves: 0 }));
    expect(draw.entries).toHaveLength(2500);
    for (const k of [1, 1000, 2500]) {
      expect(draw.entries[k - 1]?.unit).toBe(unitByHand(frame.frameSha256, 70, SEED, k));
    }
  }, 20_000);

  test("while a draw is live another can't be declared", async () => {
    await drawCells(team, declaring(frame.frameId));
    const more = await team.planner.call(declareDraw, { params: here(), body: declaring(frame.frameId) });
    expect(more.json.code).toBe("draw-live");
  });

  test("the recipe quotes the text that was hashed", async () => {
    const draw = await drawCells(team, declaring(frame.frameId));
    const { json } = await team.auditor.call(readRecipe, { params: { ...here(), drawId: draw.id } });
    expect(json.shell).toContain(`quillet-draw/1|${frame.frameSha256}|${SEED}||`);
    expect(json.python).toContain("UNITS = 70");
  });
});

describe("withdrawing", () => {
  test("a withdrawn draw stays on record and the next is drawn beside it", async () => {
    const first = await drawCells(team, declaring(frame.frameId), "first seed");
    const params = { ...here(), drawId: first.id };
    const gone = await team.planner.call(withdrawDraw, { params, body: { reason: "a permit was refused" } });
    expect(gone.json).toMatchObject({ state: "withdrawn", withdrawn: { reason: "a permit was refused" } });
    const again = await team.planner.call(withdrawDraw, { params, body: { reason: "once more" } });
    expect(again.json.code).toBe("draw-withdrawn");

    const second = await drawCells(team, declaring(frame.frameId), "second seed");
    const { json } = await team.auditor.call(listDraws, { params: here() });
    expect(json.draws.map(({ number, state }) => [number, state])).toEqual([
      [2, "live"],
      [1, "withdrawn"],
    ]);
    expect(json.liveDrawId).toBe(second.id);
    expect(json.declarations.map((declared) => declared.seed?.text)).toEqual(
      expect.arrayContaining(["first seed", "second seed"]),
    );
    const kept = await team.auditor.call(readDraw, { params });
    expect(kept.json.entries.map((entry) => entry.unit)).toEqual(first.entries.map((entry) => entry.unit));
  });

  test("once waypoints are out a new draw needs a reason", async () => {
    const first = await drawCells(team, declaring(frame.frameId));
    const body = { format: "gpx" as const, nameLength: 6, prefix: "", memberId: null };
    expect((await team.lead.call(exportWaypoints, { params: here(), body })).status).toBe(200);
    const params = { ...here(), drawId: first.id };
    await team.planner.call(withdrawDraw, { params, body: { reason: "a permit was refused" } });
    const silent = await team.planner.call(declareDraw, { params: here(), body: declaring(frame.frameId) });
    expect(silent.json.code).toBe("reason-needed");
    const said = declaring(frame.frameId, { note: "the owner of the north end said no" });
    expect((await team.planner.call(declareDraw, { params: here(), body: said })).status).toBe(200);
    expect((await team.planner.call(listDraws, { params: here() })).json.waypointsExported).toBe(true);
  });
});

describe("who sees what", () => {
  test("a counter sees the entries of their own cells only", async () => {
    const draw = await drawCells(team, declaring(frame.frameId));
    const params = { ...here(), drawId: draw.id };
    expect((await team.counter.call(readDraw, { params })).json.entries).toEqual([]);
    const members = (await team.planner.call(listMembers, { params: here() })).json.members;
    const memberId = members.find((member) => member.roles.includes("counter"))?.id ?? "";
    const visitId = draw.entries[0]?.visitId ?? "";
    await team.lead.call(assignVisits, { params: here(), body: { visitIds: [visitId], memberId, day: "Monday" } });
    const seen = (await team.counter.call(readDraw, { params })).json.entries;
    expect(seen.length).toBeGreaterThan(0);
    expect(new Set(seen.map((entry) => entry.visitId))).toEqual(new Set([visitId]));
  });

  test("a lead can't declare, draw or withdraw", async () => {
    const refused = await team.lead.call(declareDraw, { params: here(), body: declaring(frame.frameId) });
    expect(refused.json.code).toBe("not-allowed");
  });
});
