import { describe, expect, test } from "vitest";
import { NO_COLUMNS, type ColumnChoice } from "#shared/counts/guess-columns.ts";
import { matchTable } from "#shared/counts/match-table.ts";
import type { ObserverAnswer } from "#shared/counts/table-observers.ts";

const members = [
  { id: "m1", name: "Zoë Marrow" },
  { id: "m2", name: "Ada Reeve" },
  { id: "m3", name: "Jo Fenn" },
  { id: "m4", name: "Jo Fenn" },
];
const cells = [1, 2, 3, 4, 5, 6].map((unit) => ({ unit, label: `A${unit}`, orders: [unit] }));
const columns: ColumnChoice = { ...NO_COLUMNS, unit: 0, count: 1, observer: 2, date: 3 };

/** One row a name, for the cells 1, 2, 3 … */
function match(names: readonly string[], observers: readonly ObserverAnswer[] = [], date = "", count = "4") {
  return matchTable({
    header: ["unit", "count", "who", "date"],
    rows: names.map((name, i) => [String(i + 1), count, name, date]),
    columns,
    cells,
    existing: new Map(),
    rules: {},
    dates: { timeZone: "UTC", now: "2031-05-20T12:00:00Z", seasonStartsOn: null, seasonEndsOn: null },
    members,
    observers,
  });
}
const asked = (got: ReturnType<typeof match>) => got.questions.map((one) => ("candidates" in one ? one.written : ""));

describe("who counted", () => {
  test("a name that is exactly a member's is that member's, and leaves nothing in the note", () => {
    const got = match(["Zoë Marrow", ""]);
    expect(got.toWrite).toMatchObject([
      { observer: { kind: "member", member: "m1" }, note: "" },
      { observer: { kind: "nobody" }, note: "" },
    ]);
    expect(got).toMatchObject({ questions: [], merged: [], notes: [] });
  });

  // NFC and NFD of the same name are the same characters to a reader.
  test("a name whose accents are written apart is still exactly that name", () => {
    expect(match(["Zoe\u0308 Marrow"]).toWrite[0]?.observer).toMatchObject({ member: "m1" });
  });

  test.each([["zoë marrow"], ["Zoe Marrow"], ["Zoë Marrow "], ["Zoë  Marrow"], ["ZOË\u00a0MARROW"]])(
    "“%s” is proposed as the member, and nothing is written before somebody says so",
    (written) => {
      const got = match([written]);
      expect(got.toWrite).toEqual([]);
      expect(got.rows[0]).toMatchObject({ verdict: "question", message: `Is “${written}” “Zoë Marrow”?` });
      expect(got.questions).toEqual([
        {
          kind: "observer",
          written,
          rows: 1,
          candidates: [{ kind: "member", member: "m1", name: "Zoë Marrow" }],
        },
      ]);
    },
  );

  test("each name is asked once, however many rows have it, and a yes merges it and is logged", () => {
    const names = ["ada reeve", "ada reeve", "Ada Reeve", "ADA REEVE"];
    expect(asked(match(names))).toEqual(["ada reeve", "ADA REEVE"]);
    const got = match(names, [
      { written: "ada reeve", member: "m2" },
      { written: "ADA REEVE", name: "ADA REEVE" },
      { written: "not in the file", member: "m1" },
    ]);
    expect(got.questions).toEqual([]);
    expect(got.toWrite.map(({ observer }) => observer)).toMatchObject([
      { member: "m2" },
      { member: "m2" },
      { member: "m2" },
      { kind: "name", name: "ADA REEVE" },
    ]);
    expect(got.toWrite[3]?.note).toBe("counted by ADA REEVE");
    expect(got.merged).toEqual([{ written: "ada reeve", member: "m2" }]);
  });

  test("a name that two members have is asked", () => {
    expect(match(["Jo Fenn"]).questions).toMatchObject([
      { written: "Jo Fenn", candidates: [{ member: "m3" }, { member: "m4" }] },
    ]);
  });

  test("a name that no member has stays in the note, and is told once", () => {
    const got = match(["R. Holt", "R. Holt", "K. Lund"]);
    expect(got.toWrite.map(({ note }) => note)).toEqual([
      "counted by R. Holt",
      "counted by R. Holt",
      "counted by K. Lund",
    ]);
    expect(got.notes).toEqual([
      "No members of the survey have these names, so they stay in the notes: R. Holt, K. Lund.",
    ]);
  });

  test("names among themselves that differ only by case, accents or spaces are proposed as the one with most rows", () => {
    const names = ["r. holt", "R. Holt", "R. Holt", "K. Lund"];
    const got = match(names);
    expect(got.questions).toEqual([
      { kind: "observer", written: "r. holt", rows: 1, candidates: [{ kind: "spelling", name: "R. Holt" }] },
    ]);
    expect(got.toWrite.map(({ unit }) => unit)).toEqual([2, 3, 4]);
    const after = match(names, [{ written: "r. holt", name: "R. Holt" }]);
    expect(after.toWrite[0]?.note).toBe("counted by R. Holt");
    expect(after.merged).toEqual([{ written: "r. holt", name: "R. Holt" }]);
  });

  test("a word that may be a zero, the order of the dates and the names are asked together", () => {
    const got = match(["ada reeve"], [], "03/04/2031");
    expect(got.questions.map(({ kind }) => kind)).toEqual(["date-order", "observer"]);
    const nil = match(["ada reeve"], [], "03/04/2031", "nil");
    expect(nil.questions.map(({ kind }) => kind)).toEqual(["zero-word", "date-order", "observer"]);
  });

  test("an answer that names no member is a mistake of the program", () => {
    expect(() => match(["ada reeve"], [{ written: "ada reeve", member: "m9" }])).toThrow(/m9/);
  });
});
