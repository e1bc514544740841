import { createHash } from "node:crypto";
import { describe, expect, test } from "vitest";
import { listEntries } from "#shared/api/counts.ts";
import { withdrawDraw } from "#shared/api/draw.ts";
import { readRecordFile } from "#shared/api/record.ts";
import { parseRecordFile } from "#shared/record/record-file.ts";
import { replay } from "#shared/record/replay.ts";
import { importsOf } from "#server/db/counts.ts";
import { importCounts } from "#server/services/import-counts.ts";
import { actingAs } from "../fixtures/acting-as.ts";
import { drawnSurveyEachTest, MADE, table } from "../fixtures/drawn-survey.ts";

const survey = drawnSurveyEachTest();

/** The newest entry of the cell at this place. */
async function entryOf(place: number) {
  const params = { ...survey.here(), visitId: survey.cell(place).id };
  return (await survey.team.lead.call(listEntries, { params })).json.entries.at(-1);
}

const rows = (lines: readonly string[]) => lines.map((line, i) => `${survey.cell(i).unit},${i},${line}`);

describe("when it was counted", () => {
  // The cells are drawn at 08:00 UTC of 2 May 2031, 10:00 in Berlin, where the survey is; the table comes twelve days later.
  test("a column that shows its order is read by it, in the survey's time zone", async () => {
    survey.server.setNow("2031-05-14T08:00:00.000Z");
    const { json } = await survey.write(
      table(["unit,count,date", ...rows(["03/05/2031", "13/05/2031 14:30", "", "14/05/2031"])]),
    );
    survey.server.setNow("2031-05-02T08:00:00.000Z");
    expect(json).toMatchObject({ written: true, dateOrder: "day-first", questions: [] });
    expect(json.notes).toContain("Dates are read with the day first: row 2 has 13/05/2031 14:30.");
    expect(json.rows.map((row) => row.day)).toEqual(["2031-05-03", "2031-05-13 14:30", "", "2031-05-14"]);
    const made = await Promise.all([0, 1, 2, 3].map(async (place) => (await entryOf(place))?.madeAt));
    expect(made).toEqual([
      "2031-05-02T22:00:00.000Z",
      "2031-05-13T12:30:00.000Z",
      "2031-05-14T08:00:00.000Z",
      "2031-05-13T22:00:00.000Z",
    ]);
  });

  test("an open order is asked, its rows wait, and the answer stands in the record", async () => {
    const file = table(["unit,count,date", ...rows(["03/04/2031", "2031-05-02"])]);
    const { json } = await survey.send(file, null);
    expect(json.questions).toMatchObject([{ kind: "date-order", written: "03/04/2031", rows: 1 }]);
    expect(json.toWrite).toBe(1);
    const done = await survey.send(file, json.fileSha256, { dateOrder: "month-first" });
    expect(done.json).toMatchObject({ written: true, toWrite: 2, dateOrder: "month-first" });
    // 4 March in Berlin, an hour ahead of UTC in winter.
    expect((await entryOf(0))?.madeAt).toBe("2031-03-03T23:00:00.000Z");
    expect(survey.lastPayload()).toMatchObject({ version: 2, written: 2, dateOrder: "month-first", merged: [] });
  });

  test("a day to come is refused by row; a day before the draw is flagged, written, and told to the auditor", async () => {
    const file = table(["unit,count,date", ...rows(["2031-05-03", "2031-05-01", "2031-05-02"])]);
    const { json } = await survey.write(file);
    expect(json.rows.map((row) => [row.verdict, row.flag === ""])).toEqual([
      ["refused", true],
      ["new", false],
      ["new", true],
    ]);
    expect(json.rows[0]?.message).toContain("3 May 2031 has not come yet");
    const report = replay(await readRecord());
    expect(report.checks.filter((check) => check.outcome === "failed")).toEqual([]);
    const { label, unit } = survey.cell(1);
    expect(report.checks.find((check) => check.id === "counts")?.detail).toBe(
      `2 counts, 0 of them zero; 1 count is dated before its cell was drawn or opened (Europe/Berlin): cell ${label} (unit ${unit}) on 2031-05-01, to be visited from 2031-05-02 10:00`,
    );
  });
});

describe("who counted", () => {
  test("a member's name makes that member the observer; whoever imports stays who entered it", async () => {
    await survey.write(table(["unit,count,observer", ...rows(["Counter", "R. Holt"])]));
    expect(await entryOf(0)).toMatchObject({ observer: "Counter", enteredBy: "Lead", note: "" });
    expect(await entryOf(1)).toMatchObject({ observer: "Lead", enteredBy: "Lead", note: "counted by R. Holt" });
  });

  test("a name that differs by case or spaces is merged after a yes only, and the merge is logged", async () => {
    const file = table(["unit,count,observer", ...rows(["COUNTER ", "counter"])]);
    const asked = await survey.send(file, null);
    expect(asked.json.questions).toMatchObject([
      { kind: "observer", written: "COUNTER ", candidates: [{ kind: "member", name: "Counter" }] },
      { kind: "observer", written: "counter" },
    ]);
    const held = await survey.send(file, asked.json.fileSha256);
    expect(held.json).toMatchObject({ written: false, toWrite: 0 });
    const member = await survey.memberWith("counter");
    const observers = [
      { written: "COUNTER ", member },
      { written: "counter", name: "counter" },
    ];
    const { json } = await survey.send(file, asked.json.fileSha256, { observers });
    expect(json).toMatchObject({ written: true, questions: [] });
    expect(json.rows.map((row) => row.by)).toEqual(["Counter", "counter"]);
    expect(await entryOf(0)).toMatchObject({ observer: "Counter", note: "" });
    expect(await entryOf(1)).toMatchObject({ observer: "Lead", note: "counted by counter" });
    expect(survey.lastPayload()).toMatchObject({ version: 2, merged: [{ written: "COUNTER ", member }] });
    const { db } = survey.server.platform;
    expect(importsOf(db, survey.team.surveyId)[0]?.columns).toMatchObject({ observer: 2, dateOrder: null, observers });
    expect(replay(await readRecord()).checks.filter((check) => check.outcome === "failed")).toEqual([]);
  });

  test("an answer that names nobody of the survey is refused", async () => {
    const observers = [{ written: "x", member: "nobody" }];
    const { json } = await survey.send(table(["unit,count,observer", ...rows(["x"])]), null, { observers });
    expect(json).toMatchObject({ code: "count-invalid" });
    expect(json.detail).toContain("Choose a member, or keep the name.");
  });
});

describe("what changes while a table is read", () => {
  const lines = () => ["unit,count", `${survey.cell(0).unit},7`, `${survey.cell(1).unit},8`];
  const writing = (meanwhile: () => unknown) => {
    const file = table(lines());
    const write = createHash("sha256").update(file.bytes).digest("hex");
    const wanted = { targetId: survey.targetId, zeroWords: [], write };
    return importCounts(actingAs(survey, "lead", meanwhile), file, wanted, new AbortController().signal);
  };

  test("a count that one of its cells was given meanwhile: nothing is written, and the cell is named", async () => {
    const refused = writing(() => survey.enter([survey.entry(1, { state: "counted", value: 3 }, { madeAt: MADE })]));
    await expect(refused).rejects.toMatchObject({
      code: "changed-meanwhile",
      message: `Nothing was written: cell ${survey.cell(1).label} was given a count meanwhile, 3. Read the table again and look at its rows.`,
    });
    expect(survey.kinds().slice(-2)).toEqual(["draw-made", "count-entered"]);
  });

  test("a count of another cell is no hindrance", async () => {
    const done = await writing(() => survey.enter([survey.entry(5, { state: "counted", value: 3 })]));
    expect(done.written).toBe(true);
  });

  test("a draw that was withdrawn meanwhile: nothing is written", async () => {
    const { drawId } = await survey.visits();
    const refused = writing(() =>
      survey.team.planner.call(withdrawDraw, {
        params: { ...survey.here(), drawId: drawId ?? "" },
        body: { reason: "the wrong boundary" },
      }),
    );
    await expect(refused).rejects.toMatchObject({ code: "changed-meanwhile" });
    expect(survey.kinds().at(-1)).toBe("draw-withdrawn");
  });
});

// 5,000 rows are listed at most; the row that is written stands last in the file and is kept, the rest is counted.
test("a table of many thousand rows lists those that matter, and counts all", async () => {
  const many = Array.from({ length: 6000 }, () => "999999,1");
  const { json } = await survey.send(table(["unit,count", ...many, `${survey.cell(0).unit},7`]), null);
  expect(json.rows).toHaveLength(5000);
  expect(json.rows.at(-1)).toMatchObject({ row: 6001, verdict: "new" });
  expect(json.numbers).toMatchObject({ "not-drawn": 6000, new: 1, refused: 0 });
});

async function readRecord() {
  const reply = await survey.team.auditor.call(readRecordFile, { params: survey.here() });
  return parseRecordFile(new TextDecoder().decode(reply.bytes));
}
