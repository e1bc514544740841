import { describe, expect, test } from "vitest";
import { NO_COLUMNS, type ColumnChoice } from "#shared/counts/guess-columns.ts";
import { matchTable, type TableToMatch } from "#shared/counts/match-table.ts";
import type { DateRules } from "#shared/counts/table-dates.ts";

// Drawn on 2 May 2031 at 08:00 UTC, 10:00 in Berlin. Read on 20 May 2031 at noon UTC.
const OPENED = "2031-05-02T08:00:00.000Z";
const cells = [1, 2, 3, 4, 5].map((unit) => ({ unit, label: `A${unit}`, orders: [unit], openedAt: OPENED }));
const columns: ColumnChoice = { ...NO_COLUMNS, unit: 0, count: 1, date: 2, note: 3 };

/** One row a date, for the cells 1, 2, 3 … */
function match(dates: readonly string[], rules: Partial<DateRules> = {}, rest: Partial<TableToMatch> = {}) {
  return matchTable({
    header: ["unit", "count", "date", "note"],
    rows: dates.map((date, i) => [String(i + 1), "4", date, ""]),
    columns,
    cells,
    existing: new Map(),
    rules: {},
    dates: {
      timeZone: "Europe/Berlin",
      now: "2031-05-20T12:00:00Z",
      seasonStartsOn: null,
      seasonEndsOn: null,
      ...rules,
    },
    members: [],
    observers: [],
    ...rest,
  });
}
const moments = (got: ReturnType<typeof match>) => got.toWrite.map(({ madeAt }) => madeAt);

describe("the order of day and month", () => {
  // Berlin is two hours ahead of UTC in May, one in March.
  test("one date with a part above 12 settles the whole column, and it is told by which", () => {
    const got = match(["03/05/2031", "13/05/2031"]);
    expect(moments(got)).toEqual(["2031-05-02T22:00:00.000Z", "2031-05-12T22:00:00.000Z"]);
    expect(got.dateOrder).toBe("day-first");
    expect(got.questions).toEqual([]);
    expect(got.notes).toEqual(["Dates are read with the day first: row 2 has 13/05/2031."]);
    const american = match(["05/03/2031", "05/13/2031"]);
    expect(moments(american)).toEqual(moments(got));
    expect(american.dateOrder).toBe("month-first");
  });

  test("where no date shows it the order is asked once, and none of those rows is written", () => {
    const got = match(["03/04/2031", "05/03/2031", "2031-05-04"]);
    expect(got.rows.map((row) => row.verdict)).toEqual(["question", "question", "new"]);
    expect(got.rows[0]?.message).toBe("Does “03/04/2031” have the day or the month first?");
    expect(got.questions).toEqual([
      {
        kind: "date-order",
        why: "No date in this file shows it: no part is above 12.",
        written: "03/04/2031",
        rows: 2,
        dayFirst: "3 April 2031",
        monthFirst: "4 March 2031",
      },
    ]);
    expect(got.dateOrder).toBeNull();
    expect(got.toWrite.map(({ unit }) => unit)).toEqual([3]);
  });

  test("after the answer the rows are written by it", () => {
    const dayFirst = match(["03/05/2031", "04/05/2031"], { order: "day-first" });
    expect(moments(dayFirst)).toEqual(["2031-05-02T22:00:00.000Z", "2031-05-03T22:00:00.000Z"]);
    // 3 and 4 May, written month first.
    const monthFirst = match(["05/03/2031", "05/04/2031"], { order: "month-first" });
    expect(moments(monthFirst)).toEqual(moments(dayFirst));
    expect(monthFirst).toMatchObject({ dateOrder: "month-first", questions: [] });
  });

  test("a column with dates of both orders is asked about, and what is no day by the answer is refused", () => {
    const mixed = ["25/04/2031", "04/25/2031", "03/05/2031"];
    const asked = match(mixed);
    expect(asked.rows.map((row) => row.verdict)).toEqual(["question", "question", "question"]);
    expect(asked.questions[0]).toMatchObject({
      why: "Row 1 has 25/04/2031, which can only have the day first, and row 2 has 04/25/2031, which can only have the month first.",
      written: "03/05/2031",
    });
    const got = match(mixed, { order: "day-first" });
    expect(got.rows.map((row) => row.verdict)).toEqual(["new", "refused", "new"]);
    expect(got.rows[1]?.message).toBe("“04/25/2031” is no day with the day first. Look at the sheet.");
  });

  test("rows that would not be written anyway ask nothing, but their dates still show the order", () => {
    const rest = { existing: new Map([[1, { state: "counted" as const, value: 4 }]]) };
    expect(match(["03/04/2031", "2031-05-03"], {}, rest).questions).toEqual([]);
    expect(match(["13/05/2031", "03/05/2031"], {}, rest)).toMatchObject({ dateOrder: "day-first", questions: [] });
  });
});

describe("the moment of the count", () => {
  // 00:00 of 3 May in Berlin is 22:00 UTC of 2 May; 14:30 there is 12:30 UTC.
  test("a date is its day's first moment in the survey's time zone, and with a time that time there", () => {
    expect(moments(match(["2031-05-03", "3.5.2031 14:30", "2031-05-03T14:30:00Z"]))).toEqual([
      "2031-05-02T22:00:00.000Z",
      "2031-05-03T12:30:00.000Z",
      "2031-05-03T14:30:00.000Z",
    ]);
    expect(match(["2031-05-03", "3.5.2031 14:30"]).rows.map((row) => row.day)).toEqual([
      "2031-05-03",
      "2031-05-03 14:30",
    ]);
  });

  test("without a date nothing is said of the moment; what is no date stays in the note, and the row says so", () => {
    const got = match(["", "Monday"]);
    expect(got.toWrite).toMatchObject([
      { madeAt: null, note: "" },
      { madeAt: null, note: "on Monday" },
    ]);
    expect(got.rows[1]?.flag).toBe("“Monday” is no date: it stays in the note, and the count is dated now.");
  });

  // 47606 is 3 May 2030 (Python: datetime(1899, 12, 30) + timedelta(days=47606)).
  test("a spreadsheet's day number is read, and told", () => {
    const got = match(["47606"]);
    expect(got.rows[0]?.day).toBe("2030-05-03");
    expect(got.notes).toEqual([
      "Dates written as a spreadsheet's day numbers were read in one row: day 1 is 1 January 1900.",
    ]);
  });
});

describe("dates that cannot be, or hardly", () => {
  // At noon UTC of the 20th it is 14:00 of the 20th in Berlin, and 00:00 of the 21st in Auckland (UTC+12).
  test("a day to come is refused; today is not to come", () => {
    const got = match(["21.05.2031", "2031-05-20", "2031-05-20 14:01"]);
    expect(got.rows.map((row) => row.verdict)).toEqual(["refused", "new", "refused"]);
    expect(got.rows[0]?.message).toBe("21 May 2031 has not come yet (“21.05.2031”). Look at the sheet.");
    expect(match(["21.05.2031"], { timeZone: "Pacific/Auckland" }).rows[0]?.verdict).toBe("new");
  });

  test("a two-figure year is of this century, so that 98 is refused rather than guessed at", () => {
    expect(match(["13/05/98"]).rows[0]?.message).toBe("13 May 2098 has not come yet (“13/05/98”). Look at the sheet.");
  });

  test("a day that the calendar lacks is refused", () => {
    expect(match(["31.02.2031"]).rows[0]).toMatchObject({
      verdict: "refused",
      message: "There is no day “31.02.2031”. Look at the sheet.",
    });
  });

  test("a day outside the season is flagged and written", () => {
    const got = match(["2031-05-03", "2031-05-04", "2031-05-11"], {
      seasonStartsOn: "2031-05-04",
      seasonEndsOn: "2031-05-10",
    });
    expect(got.rows.map((row) => row.flag)).toEqual([
      "Before the season, which begins on 2031-05-04.",
      "",
      "After the season, which ended on 2031-05-10.",
    ]);
    expect(got.toWrite).toHaveLength(3);
  });

  test("a day before the cell was drawn is flagged and written; the day of the draw is not", () => {
    const got = match(["2031-05-01", "2031-05-02", "2031-05-02 09:59", "2031-05-02 10:00"]);
    const flag = (day: string) => `Dated ${day}, before the cell was drawn or opened (2 May 2031). The record says so.`;
    expect(got.rows.map((row) => row.flag)).toEqual([flag("1 May 2031"), "", flag("2 May 2031"), ""]);
    expect(got.toWrite).toHaveLength(4);
  });
});
