import { describe, expect, test } from "vitest";
import type { CellCount } from "#shared/counts/count.ts";
import { matchTable, type TableToMatch } from "#shared/counts/match-table.ts";

const cells = [
  { unit: 434, label: "F19", orders: [21] },
  { unit: 65, label: "V5", orders: [17] },
  { unit: 301, label: "Z14", orders: [20] },
  { unit: 632, label: "J25", orders: [3, 18] },
  { unit: 12, label: "MAR3", orders: [5] },
];

function match(rows: string[][], rest: Partial<TableToMatch> = {}) {
  return matchTable({
    header: ["unit", "label", "count", "state", "note"],
    rows,
    cells,
    existing: new Map(),
    rules: {},
    dates: { timeZone: "UTC", now: "2031-05-20T12:00:00Z", seasonStartsOn: null, seasonEndsOn: null },
    members: [],
    observers: [],
    ...rest,
  });
}
const verdicts = (rows: string[][], rest: Partial<TableToMatch> = {}) =>
  match(rows, rest).rows.map((row) => row.verdict);
const existing = (entries: Record<number, CellCount>) => ({
  existing: new Map(Object.entries(entries).map(([unit, count]) => [Number(unit), count])),
});

describe("each row is judged before anything is written", () => {
  test("a drawn cell without a count is new, zero included", () => {
    const got = match([
      ["434", "F19", "12", "", ""],
      ["65", "", "0", "", ""],
      ["", "z14", "3", "", "wet"],
    ]);
    expect(got.rows.map((row) => row.verdict)).toEqual(["new", "new", "new"]);
    expect(got.toWrite).toMatchObject([
      { row: 1, unit: 434, label: "F19", count: { state: "counted", value: 12 } },
      { row: 2, unit: 65, label: "V5", count: { state: "counted", value: 0 } },
      { row: 3, unit: 301, label: "Z14", count: { state: "counted", value: 3 }, note: "wet" },
    ]);
    expect(got.rows[1]?.message).toBe("Would be written: zero.");
  });

  test("a cell that is here with the same number is the same; another number is asked, never averaged", () => {
    const here = existing({ 434: { state: "counted", value: 12 }, 65: { state: "refused" } });
    const got = match(
      [
        ["434", "", "12", "", ""],
        ["65", "", "4", "", ""],
      ],
      here,
    );
    expect(got.rows.map((row) => row.verdict)).toEqual(["same", "different"]);
    expect(got.rows[1]?.message).toContain("Here: refused; in the file: 4. Is it a recount or a correction?");
    expect(got.toWrite).toEqual([]);
  });

  test("a cell that is not drawn is kept aside", () => {
    const got = match([
      ["999", "", "12", "", ""],
      ["", "Q1", "4", "", ""],
    ]);
    expect(got.rows.map((row) => [row.verdict, row.cell])).toEqual([
      ["not-drawn", "999"],
      ["not-drawn", "Q1"],
    ]);
    expect(got.rows[0]?.message).toBe("Counted but not drawn: kept aside, not used.");
    expect(got.toWrite).toEqual([]);
  });

  test("no count in a row is not yet counted, not 0", () => {
    const got = match([
      ["434", "", "", "", ""],
      ["65", "", "-", "", ""],
      ["301", "", "n/a", "", ""],
    ]);
    expect(got.rows.map((row) => row.verdict)).toEqual(["empty", "empty", "empty"]);
    expect(got.toWrite).toEqual([]);
  });

  test("questions and refusals are told by kind with their number of rows", () => {
    const got = match(
      [
        ["434", "", "nil", "", ""],
        ["65", "", ">50", "", ""],
        ["301", "", "2.5", "", ""],
        ["632", "", ">9", "", ""],
        ["", "", "3", "", ""],
      ],
      { rules: { wholeNumbers: true } },
    );
    expect(got.rows.map((row) => row.verdict)).toEqual(["question", "refused", "question", "refused", "refused"]);
    expect(got.kinds).toEqual([
      { kind: "zero-word", rows: 1 },
      { kind: "bound", rows: 2 },
      { kind: "fraction", rows: 1 },
      { kind: "no-cell", rows: 1 },
    ]);
    expect(got.numbers).toEqual({ new: 0, same: 0, different: 0, "not-drawn": 0, empty: 0, question: 2, refused: 3 });
  });

  test("after a yes to its word nil is written as zero", () => {
    const got = match([["434", "", "nil", "", ""]], { rules: { zeroWords: ["nil"] } });
    expect(got.toWrite).toMatchObject([{ unit: 434, count: { state: "counted", value: 0 } }]);
  });
});

describe("a cell that stands in two rows", () => {
  // J25 is pick 3 and pick 18: one count serves both.
  test("each word that may be a zero is asked once, with its number of rows", () => {
    const got = match([
      ["434", "", "nil", "counted", ""],
      ["65", "", "None  found", "", ""],
      ["301", "", "NIL", "", ""],
      ["632", "", "", "counted", ""],
    ]);
    expect(got.questions).toEqual([
      { kind: "zero-word", word: "nil", rows: 2 },
      { kind: "zero-word", word: "none found", rows: 1 },
    ]);
    const after = match([["434", "", "NIL", "", ""]], { rules: { zeroWords: ["nil"] } });
    expect(after.toWrite[0]?.count).toEqual({ state: "counted", value: 0 });
    expect(after.questions).toEqual([]);
  });

  test("equal rows of a repeat count once, and the second is told which picks it serves", () => {
    const got = match([
      ["632", "", "2", "", ""],
      ["632", "", "2", "", ""],
    ]);
    expect(got.rows.map((row) => row.verdict)).toEqual(["new", "same"]);
    expect(got.rows[1]?.message).toBe("One count serves picks 3 and 18; row 1 has it already.");
    expect(got.toWrite).toHaveLength(1);
  });

  test("different rows of a repeat wait until somebody says which is the count", () => {
    const got = match([
      ["632", "", "2", "", ""],
      ["434", "", "1", "", ""],
      ["", "J25", "5", "", ""],
    ]);
    expect(got.rows.map((row) => row.verdict)).toEqual(["different", "new", "different"]);
    expect(got.rows[2]?.message).toBe(
      "The same cell with different numbers: 2 in row 1 and 5 in row 3. One count serves picks 3 and 18. Say which is the count and which is a recount.",
    );
    expect(got.toWrite.map((entry) => entry.unit)).toEqual([434]);
  });

  test("a row without a count takes nothing away from the one that has it", () => {
    const got = verdicts([
      ["434", "", "", "", ""],
      ["434", "", "7", "", ""],
    ]);
    expect(got).toEqual(["empty", "new"]);
  });

  test("twenty thousand rows of one cell name the first few only", () => {
    const rows = Array.from({ length: 20_000 }, (_, i) => ["434", "", String(i % 3), "", ""]);
    const got = match(rows);
    expect(got.numbers.different).toBe(20_000);
    expect(got.rows[0]?.message.length).toBeLessThan(250);
  });
});

describe("units and labels", () => {
  test("a unit and a label that contradict each other are refused", () => {
    const got = match([["434", "V5", "3", "", ""]]);
    expect(got.rows[0]).toMatchObject({ verdict: "refused", kind: "unit-label" });
    expect(got.rows[0]?.message).toBe("Unit 434 is cell F19, and the row says V5. Correct one of them.");
  });

  test("a label that a spreadsheet made a date of is refused by name, unless the unit says which cell it is", () => {
    const got = match([
      ["", "3-Mar", "4", "", ""],
      ["12", "3-Mar", "4", "", ""],
    ]);
    expect(got.rows.map((row) => row.verdict)).toEqual(["refused", "new"]);
    expect(got.rows[0]?.message).toBe(
      "The label “3-Mar” looks like a date made by a spreadsheet. Use the unit column.",
    );
  });

  test("units with lost or added zeros, other digits or a decimal zero are the same unit", () => {
    expect(
      verdicts([
        ["065", "", "1", "", ""],
        ["301.0", "", "1", "", ""],
        ["٤٣٤", "", "1", "", ""],
      ]),
    ).toEqual(["new", "new", "new"]);
    expect(match([["12.5", "", "1", "", ""]]).rows[0]?.kind).toBe("unit-unreadable");
  });
});

describe("states in the table", () => {
  test("a state without a number is that state, with its reason", () => {
    const got = match([
      ["434", "", "", "Refused", "owner said no"],
      ["65", "", "", "not in the population", ""],
      ["301", "", "0", "counted", ""],
    ]);
    expect(got.toWrite.map((entry) => entry.count)).toEqual([
      { state: "refused", reason: "owner said no" },
      { state: "not-in-population" },
      { state: "counted", value: 0 },
    ]);
  });

  test("a state and a number that contradict each other are asked about", () => {
    const got = match([
      ["434", "", "5", "refused", ""],
      ["65", "", "", "counted", ""],
      ["301", "", "", "closed for lunch", ""],
      ["632", "", "", "not visited yet", ""],
    ]);
    expect(got.rows.map((row) => row.verdict)).toEqual(["question", "question", "refused", "empty"]);
  });
});

describe("beside the rows", () => {
  test("drawn cells that the table doesn't name are not yet counted", () => {
    const got = match([["434", "", "", "", ""]], existing({ 65: { state: "counted", value: 0 } }));
    expect(got.notInTable.map((cell) => cell.label)).toEqual(["Z14", "J25", "MAR3"]);
  });

  // 50 is at least ten times 2, the next highest.
  test("a count ten times the next largest is flagged and kept", () => {
    const got = match([
      ["434", "", "50", "", ""],
      ["65", "", "2", "", ""],
      ["301", "", "1", "", ""],
    ]);
    expect(got.rows.map((row) => row.verdict)).toEqual(["new", "new", "new"]);
    expect(got.rows.map((row) => row.flag)).toEqual([
      "Far above the next highest here, 2. Check the sheet; it stays as it is.",
      "",
      "",
    ]);
    expect(got.toWrite).toHaveLength(3);
  });

  test("where no column can be found it says what to choose", () => {
    const got = match([["x", "y"]], { header: ["a", "b"] });
    expect(got.notes).toEqual([
      "No column names the cells. Say which holds the unit number or the label.",
      "No column holds counts. Say which one does.",
    ]);
  });
});
