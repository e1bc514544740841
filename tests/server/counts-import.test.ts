import { describe, expect, test } from "vitest";
import { importCounts } from "#shared/api/counts.ts";
import { listVisits } from "#shared/api/field.ts";
import { drawnSurveyEachTest, table } from "../fixtures/drawn-survey.ts";
import { anotherSurvey } from "../fixtures/sealed-frame.ts";

const survey = drawnSurveyEachTest();

describe("a table of counts", () => {
  test("is judged row by row and nothing is written", async () => {
    await survey.enter([
      survey.entry(3, { state: "counted", value: 5 }),
      survey.entry(4, { state: "counted", value: 6 }),
    ]);
    const undrawn =
      [...Array(70).keys()].map((i) => i + 1).find((unit) => !survey.cells.some((one) => one.unit === unit)) ?? 0;
    const file = table([
      "unit,cell,count,note",
      `${survey.cell(0).unit},${survey.cell(0).label},7,`,
      `${survey.cell(1).unit},${survey.cell(1).label},,`,
      `${survey.cell(2).unit},${survey.cell(2).label},nil,`,
      `${survey.cell(3).unit},${survey.cell(3).label},5,`,
      `${survey.cell(4).unit},${survey.cell(4).label},9,`,
      `${survey.cell(5).unit},${survey.cell(5).label},-2,`,
      `${undrawn},,4,`,
    ]);
    const before = survey.kinds().length;
    const { json } = await survey.send(file, null);
    expect(json.rows.map((row) => row.verdict)).toEqual([
      ...["new", "empty", "question", "same", "different", "refused", "not-drawn"],
    ]);
    expect(json).toMatchObject({
      toWrite: 1,
      written: false,
      importedBefore: null,
      columns: { unit: 0, label: 1, count: 2, note: 3 },
    });
    expect(json.notInTable).toEqual(survey.cells.slice(6).map((one) => one.label));
    expect(survey.kinds()).toHaveLength(before);
  });

  test("is written only with the hash that was judged, in one go, and is known when it comes again", async () => {
    const file = table([
      "unit,count,note,observer",
      `${survey.cell(0).unit},7,=SUM(A1:A9),A. Reeve`,
      `${survey.cell(1).unit},0,,`,
      `${survey.cell(2).unit},refused,,`,
    ]);
    const judged = await survey.send(file, null);
    const other = await survey.send(table(["unit,count", `${survey.cell(0).unit},8`]), judged.json.fileSha256);
    expect(other.json.code).toBe("table-changed");
    const { json } = await survey.send(file, judged.json.fileSha256);
    expect(json).toMatchObject({ written: true, toWrite: 3 });
    expect(survey.kinds().slice(-4)).toEqual(["count-entered", "count-entered", "count-entered", "counts-imported"]);
    const now = (await survey.team.lead.call(listVisits, { params: survey.here() })).json.visits;
    expect(now.slice(0, 3).map((one) => one.count)).toMatchObject([
      // Formula text stays text.
      { state: "counted", value: 7, note: "=SUM(A1:A9); counted by A. Reeve" },
      { state: "counted", value: 0 },
      { state: "refused" },
    ]);
    const again = await survey.send(file, judged.json.fileSha256);
    expect(again.json).toMatchObject({ written: false, toWrite: 0, importedBefore: "2031-05-02T08:00:00.000Z" });
    expect(again.json.rows.map((row) => row.verdict)).toEqual(["same", "same", "same"]);
    expect(survey.kinds().filter((kind) => kind === "counts-imported")).toHaveLength(1);
  });
});

describe("what is asked and refused", () => {
  test("a word that means zero is asked, and written as zero once somebody has said so", async () => {
    const file = table(["unit,count", `${survey.cell(0).unit},nil`]);
    const asked = await survey.send(file, null);
    expect(asked.json).toMatchObject({ toWrite: 0 });
    const { json } = await survey.send(file, asked.json.fileSha256, { zeroWords: ["nil"] });
    expect(json.written).toBe(true);
    const now = (await survey.team.lead.call(listVisits, { params: survey.here() })).json.visits;
    expect(now[0]?.count).toMatchObject({ state: "counted", value: 0 });
  });

  test("columns that a person chose are taken in place of the guess", async () => {
    const file = table(["a,b,c", `${survey.cell(0).unit},1,4`]);
    const columns = { unit: 0, label: -1, count: 2, state: -1, note: -1 };
    const { json } = await survey.send(file, null, { columns });
    expect(json.rows[0]).toMatchObject({ verdict: "new", said: "4" });
  });

  test("an empty file, an unknown target and a survey without a draw are refused", async () => {
    expect((await survey.send({ name: "x.csv", bytes: new Uint8Array() }, null)).json.code).toBe("file-empty");
    const file = table(["unit,count", "1,2"]);
    expect((await survey.send(file, null, { targetId: "x" })).json.code).toBe("count-invalid");
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
          body: { targetId: survey.targetId, zeroWords: [], write: null },
          file,
        })
      ).json.code,
    ).toBe("not-allowed");
  });
});
