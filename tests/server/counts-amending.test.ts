import { randomUUID } from "node:crypto";
import { beforeEach, describe, expect, test } from "vitest";
import { amendCount, enterCounts, listEntries } from "#shared/api/counts.ts";
import { type Visit } from "#shared/api/field.ts";
import { declaring, drawCells } from "../fixtures/sealed-frame.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";

const survey = surveyEachTest();

const MADE = "2031-05-02T07:00:00Z";
let visits: Visit[];
let targetId: string;

/** Ten different cells drawn. */
async function begin(): Promise<void> {
  await drawCells(survey.team, declaring(survey.frame.frameId, { design: { kind: "srs-wor", n: 10 } }));
  ({ visits, targetId } = await survey.visits());
}
beforeEach(() => begin(), 30_000);

const visit = (place: number): Visit => {
  const found = visits[place];
  if (!found) throw new Error(`no visit ${place}`);
  return found;
};
type Said = { state: "counted"; value: number } | { state: "refused" | "not-in-population" | "lost" };
const entry = (place: number, said: Said, changes: Record<string, unknown> = {}) => ({
  id: randomUUID() as string,
  visitId: visit(place).id,
  targetId,
  said,
  note: "",
  madeAt: MADE,
  ...changes,
});
const enter = (entries: ReturnType<typeof entry>[], client = survey.team.lead) =>
  client.call(enterCounts, { params: survey.here(), body: { entries } });
describe("amending", () => {
  const amend = (
    place: number,
    replaces: string,
    said: Said,
    changes: Record<string, unknown> = {},
    client = survey.team.lead,
  ) =>
    client.call(amendCount, {
      params: { ...survey.here(), visitId: visit(place).id },
      body: {
        id: randomUUID(),
        targetId,
        replaces,
        said,
        note: "",
        reason: "misread the sheet",
        madeAt: MADE,
        ...changes,
      },
    });

  test("the old value stays with who, when and why; the new one is in force", async () => {
    const first = entry(0, { state: "counted", value: 3 });
    await enter([first]);
    survey.server.setNow("2031-05-03T10:00:00.000Z");
    const { json } = await amend(0, first.id, { state: "counted", value: 8 }, {}, survey.team.planner);
    expect(json.count).toMatchObject({ state: "counted", value: 8, amended: true, by: "Lead" });
    const list = await survey.team.lead.call(listEntries, { params: { ...survey.here(), visitId: visit(0).id } });
    expect(list.json.entries).toMatchObject([
      { value: 3, replaces: null, reason: "", enteredBy: "Lead" },
      {
        value: 8,
        replaces: first.id,
        reason: "misread the sheet",
        enteredBy: "Planner",
        enteredAt: "2031-05-03T10:00:00.000Z",
      },
    ]);
    expect(survey.kinds().at(-1)).toBe("count-amended");
    survey.server.setNow("2031-05-02T08:00:00.000Z");
  });

  test("an amendment of what is no longer in force is refused, and one sent twice is kept once", async () => {
    const first = entry(0, { state: "counted", value: 3 });
    await enter([first]);
    const id = randomUUID();
    const once = await amend(0, first.id, { state: "counted", value: 8 }, { id });
    const twice = await amend(0, first.id, { state: "counted", value: 8 }, { id });
    expect(twice.json).toEqual(once.json);
    const late = await amend(0, first.id, { state: "counted", value: 9 });
    expect(late.json.code).toBe("changed-meanwhile");
    expect(late.json.detail).toContain("8");
  });

  test("where nothing is written down there is nothing to amend; a reason is needed; a counter can't", async () => {
    expect((await amend(0, randomUUID(), { state: "counted", value: 1 })).json.code).toBe("count-missing");
    const first = entry(0, { state: "counted", value: 3 });
    await enter([first]);
    expect((await amend(0, first.id, { state: "lost" }, { reason: "" })).json.code).toBe("input-invalid");
    expect((await amend(0, first.id, { state: "counted", value: 0.5 })).json.code).toBe("count-invalid");
    expect((await amend(0, first.id, { state: "lost" }, {}, survey.team.counter)).json.code).toBe("not-allowed");
  });
});
