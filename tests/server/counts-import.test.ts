import { randomUUID } from "node:crypto";
import { beforeEach, describe, expect, test } from "vitest";
import { enterCounts, importCounts } from "#shared/api/counts.ts";
import { listVisits, type Visit } from "#shared/api/field.ts";
import { anotherSurvey, declaring, drawCells } from "../fixtures/sealed-frame.ts";
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
const table = (lines: string[]) => ({ name: "counts.csv", bytes: new TextEncoder().encode(`${lines.join("\n")}\n`) });
const send = (file: { name: string; bytes: Uint8Array }, write: string | null, changes: Record<string, unknown> = {}) =>
  survey.team.lead.call(importCounts, {
    params: survey.here(),
    body: { targetId, zeroWords: [], write, ...changes },
    file,
  });

describe("a table of counts", () => {
  test("is judged row by row and nothing is written", async () => {
    await enter([entry(3, { state: "counted", value: 5 }), entry(4, { state: "counted", value: 6 })]);
    const undrawn =
      [...Array(70).keys()].map((i) => i + 1).find((unit) => !visits.some((one) => one.unit === unit)) ?? 0;
    const file = table([
      "unit,cell,count,note",
      `${visit(0).unit},${visit(0).label},7,`,
      `${visit(1).unit},${visit(1).label},,`,
      `${visit(2).unit},${visit(2).label},nil,`,
      `${visit(3).unit},${visit(3).label},5,`,
      `${visit(4).unit},${visit(4).label},9,`,
      `${visit(5).unit},${visit(5).label},-2,`,
      `${undrawn},,4,`,
    ]);
    const before = survey.kinds().length;
    const { json } = await send(file, null);
    expect(json.rows.map((row) => row.verdict)).toEqual([
      ...["new", "empty", "question", "same", "different", "refused", "not-drawn"],
    ]);
    expect(json).toMatchObject({
      toWrite: 1,
      written: false,
      importedBefore: null,
      columns: { unit: 0, label: 1, count: 2, note: 3 },
    });
    expect(json.notInTable).toEqual(visits.slice(6).map((one) => one.label));
    expect(survey.kinds()).toHaveLength(before);
  });

  test("is written only with the hash that was judged, in one go, and is known when it comes again", async () => {
    const file = table([
      "unit,count,note,observer",
      `${visit(0).unit},7,=SUM(A1:A9),A. Reeve`,
      `${visit(1).unit},0,,`,
      `${visit(2).unit},refused,,`,
    ]);
    const judged = await send(file, null);
    const other = await send(table(["unit,count", `${visit(0).unit},8`]), judged.json.fileSha256);
    expect(other.json.code).toBe("table-changed");
    const { json } = await send(file, judged.json.fileSha256);
    expect(json).toMatchObject({ written: true, toWrite: 3 });
    expect(survey.kinds().slice(-4)).toEqual(["count-entered", "count-entered", "count-entered", "counts-imported"]);
    const now = (await survey.team.lead.call(listVisits, { params: survey.here() })).json.visits;
    expect(now.slice(0, 3).map((one) => one.count)).toMatchObject([
      // Formula text stays text.
      { state: "counted", value: 7, note: "=SUM(A1:A9); counted by A. Reeve" },
      { state: "counted", value: 0 },
      { state: "refused" },
    ]);
    const again = await send(file, judged.json.fileSha256);
    expect(again.json).toMatchObject({ written: false, toWrite: 0, importedBefore: "2031-05-02T08:00:00.000Z" });
    expect(again.json.rows.map((row) => row.verdict)).toEqual(["same", "same", "same"]);
    expect(survey.kinds().filter((kind) => kind === "counts-imported")).toHaveLength(1);
  });
});

describe("what is asked and refused", () => {
  test("a word that means zero is asked, and written as zero once somebody has said so", async () => {
    const file = table(["unit,count", `${visit(0).unit},nil`]);
    const asked = await send(file, null);
    expect(asked.json).toMatchObject({ toWrite: 0 });
    const { json } = await send(file, asked.json.fileSha256, { zeroWords: ["nil"] });
    expect(json.written).toBe(true);
    const now = (await survey.team.lead.call(listVisits, { params: survey.here() })).json.visits;
    expect(now[0]?.count).toMatchObject({ state: "counted", value: 0 });
  });

  test("columns that a person chose are taken in place of the guess", async () => {
    const file = table(["a,b,c", `${visit(0).unit},1,4`]);
    const columns = { unit: 0, label: -1, count: 2, state: -1, note: -1 };
    const { json } = await send(file, null, { columns });
    expect(json.rows[0]).toMatchObject({ verdict: "new", said: "4" });
  });

  test("an empty file, an unknown target and a survey without a draw are refused", async () => {
    expect((await send({ name: "x.csv", bytes: new Uint8Array() }, null)).json.code).toBe("file-empty");
    const file = table(["unit,count", "1,2"]);
    expect((await send(file, null, { targetId: "x" })).json.code).toBe("count-invalid");
    const bare = await anotherSurvey(survey.team);
    const params = { surveyId: bare.surveyId };
    const target = (await bare.planner.call(listVisits, { params })).json.targetId;
    const none = await bare.lead.call(importCounts, {
      params,
      body: { targetId: target, zeroWords: [], write: null },
      file,
    });
    expect(none.json.code).toBe("draw-missing");
    expect(
      (
        await survey.team.counter.call(importCounts, {
          params: survey.here(),
          body: { targetId, zeroWords: [], write: null },
          file,
        })
      ).json.code,
    ).toBe("not-allowed");
  });
});
