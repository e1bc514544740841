import { describe, expect, test } from "vitest";
import type { FrameSpec } from "#shared/api/frame.ts";
import { draftNow, listFrames, saveDraftFrame } from "#shared/api/frame.ts";
import { assignmentsNow, assignVisits } from "#shared/api/field.ts";
import { changeSettings, readSettings } from "#shared/api/settings.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";
import { declaring, drawCells } from "../fixtures/sealed-frame.ts";

const survey = surveyEachTest();
const here = () => survey.here();

/** What a refusal says stands now. */
function nowOf(json: unknown): unknown {
  return (json as { question?: { kind: string; current: unknown } }).question?.current;
}

describe("two planners at the settings", () => {
  test("the second is refused with what stands now and its version, and may then write on that", async () => {
    const { planner } = survey.team;
    const first = await planner.call(readSettings, { params: here() });
    const version = first.headers.get("etag");
    expect(version).toMatch(/^"[\w-]{22}"$/);
    const body = { ...first.json, name: "North" };
    const kept = await planner.call(changeSettings, { params: here(), body, version });
    expect(kept.headers.get("etag")).not.toBe(version);

    const mine = { ...first.json, safetyNotes: "Tides" };
    const late = await planner.call(changeSettings, { params: here(), body: mine, version });
    expect(late).toMatchObject({ status: 412, json: { code: "changed-meanwhile" } });
    expect(nowOf(late.json)).toEqual(body);
    const question = (late.json as { question?: { version: string } }).question;
    expect(question?.version).toBe(kept.headers.get("etag"));
    const after = { ...body, safetyNotes: "Tides" };
    const again = await planner.call(changeSettings, { params: here(), body: after, version: question?.version ?? "" });
    expect(again.json).toEqual(after);
  });

  test("a write that does not say what it saw is refused", async () => {
    const { json } = await survey.team.planner.call(readSettings, { params: here() });
    const reply = await survey.team.planner.call(changeSettings, { params: here(), body: json });
    expect(reply).toMatchObject({ status: 428, json: { code: "version-missing" } });
  });

  test("of two that write at once one is kept and one refused", async () => {
    const { json, headers } = await survey.team.planner.call(readSettings, { params: here() });
    const write = (name: string) =>
      survey.team.planner.call(changeSettings, {
        params: here(),
        body: { ...json, name },
        version: headers.get("etag"),
      });
    const replies = await Promise.all([write("one"), write("two")]);
    expect(replies.map(({ status }) => status).toSorted()).toEqual([200, 412]);
    expect(survey.kinds().filter((kind) => kind === "settings-changed")).toHaveLength(1);
  });
});

describe("two planners at a draft of the frame", () => {
  const save = (spec: FrameSpec, seen: string | null) =>
    survey.team.planner.call(saveDraftFrame, { params: here(), body: { spec, seen } });

  async function startSpec(): Promise<FrameSpec> {
    const { frames } = (await survey.team.planner.call(listFrames, { params: here() })).json;
    const spec = frames[0]?.spec;
    if (!spec) throw new Error("no frame");
    return spec;
  }
  const withSide = (spec: FrameSpec, side: number): FrameSpec => ({
    ...spec,
    cells: { ...spec.cells, widthMm: side, heightMm: side },
  });

  test("the second is refused with the draft that is kept now, and may then write over that", async () => {
    const spec = await startSpec();
    const first = await save(withSide(spec, 30_000), null);
    expect(first.status).toBe(200);
    const late = await save(withSide(spec, 40_000), null);
    expect(late).toMatchObject({ status: 412, json: { code: "changed-meanwhile" } });
    const now = draftNow.parse(nowOf(late.json));
    expect(now).toEqual({ spec: withSide(spec, 30_000), draftSha256: first.json.draftSha256 });
    const again = await save(withSide(spec, 40_000), now?.draftSha256 ?? null);
    expect(again.json).toMatchObject({ id: first.json.id, number: 2 });
    const stale = await save(withSide(spec, 60_000), first.json.draftSha256);
    expect(stale.json.code).toBe("changed-meanwhile");
  });

  test("a draft that is sent twice, because the answer was lost, is kept once", async () => {
    const spec = withSide(await startSpec(), 30_000);
    const first = await save(spec, null);
    const again = await save(spec, null);
    expect(again.json).toEqual(first.json);
  });

  test("whoever still sets a draft that has been sealed is told so", async () => {
    const spec = await startSpec();
    const late = await save(withSide(spec, 30_000), "ab".repeat(32));
    expect(late.json.code).toBe("changed-meanwhile");
    expect(late.json.detail).toContain("sealed as version 1");
    expect(nowOf(late.json)).toBeNull();
  });
});

describe("two leads who share out the same cells", () => {
  const give = (
    visitIds: string[],
    memberId: string | null,
    day: string,
    seen: { memberId: string; day: string } | null,
  ) =>
    survey.team.lead.call(assignVisits, {
      params: here(),
      body: { visitIds, memberId, day, seen: seen === null ? [] : visitIds.map((visitId) => ({ visitId, ...seen })) },
    });

  test("the second is told who has them now, nothing is shared out, and then may decide", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId));
    const { visits } = await survey.visits();
    const [one, two] = visits.map(({ id }) => id);
    if (one === undefined || two === undefined) throw new Error("no cells");
    const [counter, lead] = [await survey.memberWith("counter"), await survey.memberWith("lead")];
    expect((await give([one], counter, "Tuesday", null)).status).toBe(200);

    const late = await give([one, two], lead, "Friday", null);
    expect(late).toMatchObject({ status: 412, json: { code: "changed-meanwhile" } });
    const label = visits[0]?.label ?? "";
    expect(late.json.detail).toContain(`Cell ${label} was shared out`);
    expect(assignmentsNow.parse(nowOf(late.json))).toEqual([
      { visitId: one, label, assignedTo: { memberId: counter, name: "Counter", day: "Tuesday" } },
    ]);
    expect((await survey.visits()).visits[1]?.assignedTo).toBeNull();

    const again = await survey.team.lead.call(assignVisits, {
      params: here(),
      body: {
        visitIds: [one, two],
        memberId: lead,
        day: "Friday",
        seen: [{ visitId: one, memberId: counter, day: "Tuesday" }],
      },
    });
    expect(again.json).toEqual({ assigned: 2 });
  });

  test("taking back what another has by now is refused too; what is as wanted already is no question", async () => {
    await drawCells(survey.team, declaring(survey.frame.frameId));
    const one = (await survey.visits()).visits[0]?.id ?? "";
    const [counter, lead] = [await survey.memberWith("counter"), await survey.memberWith("lead")];
    await give([one], counter, "Tuesday", null);
    expect((await give([one], counter, "Tuesday", null)).status).toBe(200);
    expect((await give([one], counter, "Wednesday", null)).json.code).toBe("changed-meanwhile");
    expect((await give([one], null, "", { memberId: lead, day: "Tuesday" })).json.code).toBe("changed-meanwhile");
    expect((await give([one], null, "", { memberId: counter, day: "Tuesday" })).status).toBe(200);
    expect((await give([one], null, "", { memberId: counter, day: "Tuesday" })).status).toBe(200);
  });
});
