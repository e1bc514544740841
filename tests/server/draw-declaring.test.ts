import { describe, expect, test } from "vitest";
import { abandonDeclaration, declareDraw, listDraws, makeDraw, readDraw, withdrawDraw } from "#shared/api/draw.ts";
import { assignVisits, exportWaypoints } from "#shared/api/field.ts";
import { listPeople } from "#shared/api/people.ts";
import { allEvents } from "#server/db/events.ts";
import { anotherSurvey, declaring, drawCells, putSealedFrame } from "../fixtures/sealed-frame.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";

const survey = surveyEachTest();
const SEED = "07391522864013975605";

describe("declaring", () => {
  test("a declaration is hashed and on record before any seed exists", async () => {
    const { status, json } = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId),
    });
    expect(status).toBe(200);
    expect(json).toMatchObject({
      state: "open",
      seed: null,
      units: 70,
      frameSha256: survey.frame.frameSha256,
      frameNumber: 1,
    });
    expect(survey.kinds().at(-1)).toBe("draw-declared");
    expect(JSON.parse(allEvents(survey.server.platform.db, survey.team.surveyId).at(-1)?.payload ?? "")).toMatchObject({
      declarationSha256: json.sha256,
    });
  });

  test("a second declaration waits until the first is drawn or abandoned", async () => {
    const first = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId),
    });
    const second = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId),
    });
    expect(second.json.code).toBe("declaration-open");
    const params = { ...survey.here(), declarationId: first.json.id };
    await survey.team.planner.call(abandonDeclaration, { params, body: { reason: "wrong number of picks" } });
    const third = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId),
    });
    expect(third.status).toBe(200);
  });

  test("an abandoned declaration stays on record with its reason and can't be drawn or abandoned again", async () => {
    const { json } = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId),
    });
    const params = { ...survey.here(), declarationId: json.id };
    const ended = await survey.team.planner.call(abandonDeclaration, {
      params,
      body: { reason: "the bog is flooded" },
    });
    expect(ended.json).toMatchObject({ state: "abandoned", abandoned: { reason: "the bog is flooded" } });
    expect((await survey.team.planner.call(makeDraw, { params, body: { seed: SEED } })).json.code).toBe(
      "declaration-closed",
    );
    const again = await survey.team.planner.call(abandonDeclaration, { params, body: { reason: "once more" } });
    expect(again.json.code).toBe("declaration-closed");
  });
});

describe("what can be declared", () => {
  test("a frame that is not sealed, or is another survey's, is refused", async () => {
    const draft = putSealedFrame(survey.server, survey.team.surveyId, { number: 2, draft: true });
    const unsealed = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(draft.frameId),
    });
    expect(unsealed.json.code).toBe("frame-not-sealed");
    const other = await anotherSurvey(survey.team);
    const theirs = putSealedFrame(survey.server, other.surveyId);
    const foreign = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(theirs.frameId),
    });
    expect(foreign.json.code).toBe("not-found");
  });

  // 66 picks + 5 reserves = 71 different cells of 70.
  test("without replacement more picks and reserves than cells are refused", async () => {
    const body = declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 66 } });
    expect((await survey.team.planner.call(declareDraw, { params: survey.here(), body })).json.code).toBe(
      "design-invalid",
    );
    const fits = declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 65 } });
    expect((await survey.team.planner.call(declareDraw, { params: survey.here(), body: fits })).status).toBe(200);
  });

  test("a level at which no limits can be computed and a note that is too long are refused by name", async () => {
    const level = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId, { level: "0.3" }),
    });
    expect(level.json).toMatchObject({ code: "input-invalid" });
    expect(level.json.detail).toContain("0.3");
    const note = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId, { note: "x".repeat(3000) }),
    });
    expect(note.json.detail).toMatch(/^note/);
  });
});

describe("withdrawing", () => {
  test("a withdrawn draw stays on record and the next is drawn beside it", async () => {
    const first = await drawCells(survey.team, declaring(survey.frame.frameId), "first seed");
    const params = { ...survey.here(), drawId: first.id };
    const gone = await survey.team.planner.call(withdrawDraw, { params, body: { reason: "a permit was refused" } });
    expect(gone.json).toMatchObject({ state: "withdrawn", withdrawn: { reason: "a permit was refused" } });
    const again = await survey.team.planner.call(withdrawDraw, { params, body: { reason: "once more" } });
    expect(again.json.code).toBe("draw-withdrawn");

    const second = await drawCells(survey.team, declaring(survey.frame.frameId), "second seed");
    const { json } = await survey.team.auditor.call(listDraws, { params: survey.here() });
    expect(json.draws.map(({ number, state }) => [number, state])).toEqual([
      [2, "live"],
      [1, "withdrawn"],
    ]);
    expect(json.liveDrawId).toBe(second.id);
    expect(json.declarations.map((declared) => declared.seed?.text)).toEqual(
      expect.arrayContaining(["first seed", "second seed"]),
    );
    const kept = await survey.team.auditor.call(readDraw, { params });
    expect(kept.json.entries.map((entry) => entry.unit)).toEqual(first.entries.map((entry) => entry.unit));
  });

  test("once waypoints are out a new draw needs a reason", async () => {
    const first = await drawCells(survey.team, declaring(survey.frame.frameId));
    const body = { format: "gpx" as const, nameLength: 6, prefix: "", memberId: null };
    expect((await survey.team.lead.call(exportWaypoints, { params: survey.here(), body })).status).toBe(200);
    const params = { ...survey.here(), drawId: first.id };
    await survey.team.planner.call(withdrawDraw, { params, body: { reason: "a permit was refused" } });
    const silent = await survey.team.planner.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId),
    });
    expect(silent.json.code).toBe("reason-needed");
    const said = declaring(survey.frame.frameId, { note: "the owner of the north end said no" });
    expect((await survey.team.planner.call(declareDraw, { params: survey.here(), body: said })).status).toBe(200);
    expect((await survey.team.planner.call(listDraws, { params: survey.here() })).json.reasonNeeded).toBe(
      "waypoints-exported",
    );
  });

  test("the third draw within 24 hours needs a reason, the third after a day does not", async () => {
    const withdrawn = async (seed: string) => {
      const draw = await drawCells(survey.team, declaring(survey.frame.frameId), seed);
      const params = { ...survey.here(), drawId: draw.id };
      await survey.team.planner.call(withdrawDraw, { params, body: { reason: "a permit was refused" } });
    };
    const asked = async () => (await survey.team.planner.call(listDraws, { params: survey.here() })).json.reasonNeeded;
    await withdrawn("first seed");
    expect(await asked()).toBeNull();
    await withdrawn("second seed");
    expect(await asked()).toBe("third-draw-in-a-day");
    const body = declaring(survey.frame.frameId);
    const silent = await survey.team.planner.call(declareDraw, { params: survey.here(), body });
    expect(silent.json.code).toBe("reason-needed");
    survey.server.setNow("2031-05-03T08:00:00.001Z");
    expect(await asked()).toBeNull();
    const nextDay = await survey.team.planner.call(declareDraw, { params: survey.here(), body });
    expect(nextDay.status).toBe(200);
  });
});

describe("who sees what", () => {
  test("a counter sees the entries of their own cells only", async () => {
    const draw = await drawCells(survey.team, declaring(survey.frame.frameId));
    const params = { ...survey.here(), drawId: draw.id };
    expect((await survey.team.counter.call(readDraw, { params })).json.entries).toEqual([]);
    const members = (await survey.team.planner.call(listPeople, { params: survey.here() })).json.members;
    const memberId = members.find((member) => member.roles.includes("counter"))?.id ?? "";
    const visitId = draw.entries[0]?.visitId ?? "";
    await survey.team.lead.call(assignVisits, {
      params: survey.here(),
      body: { visitIds: [visitId], memberId, day: "Monday" },
    });
    const seen = (await survey.team.counter.call(readDraw, { params })).json.entries;
    expect(seen.length).toBeGreaterThan(0);
    expect(new Set(seen.map((entry) => entry.visitId))).toEqual(new Set([visitId]));
  });

  test("a lead can't declare, draw or withdraw", async () => {
    const refused = await survey.team.lead.call(declareDraw, {
      params: survey.here(),
      body: declaring(survey.frame.frameId),
    });
    expect(refused.json.code).toBe("not-allowed");
  });
});
