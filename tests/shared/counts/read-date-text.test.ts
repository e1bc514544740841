import { describe, expect, test } from "vitest";
import { readDateText } from "#shared/counts/read-date-text.ts";
import { localText } from "#shared/counts/zone-time.ts";

/** What a text was read as, in short. */
function told(text: string): string {
  const reading = readDateText(text);
  switch (reading.kind) {
    case "local":
      return localText(reading.local);
    case "moment":
      return reading.at;
    case "ordered":
      return [reading.dayFirst, reading.monthFirst]
        .map((day) => (day === null ? "no day" : localText(day)))
        .join(" or ");
    case "empty":
    case "no-day":
    case "no-date":
      return reading.kind;
  }
}

describe("a date that is one day however it is read", () => {
  test.each([
    ["2031-05-03", "2031-05-03"],
    ["2031/5/3", "2031-05-03"],
    ["2031.05.03", "2031-05-03"],
    ["20310503", "2031-05-03"],
    ["3.5.2031", "2031-05-03"],
    ["03.05.31", "2031-05-03"],
    ["3. 5. 2031", "2031-05-03"],
    ["3 May 2031", "2031-05-03"],
    ["3-May-31", "2031-05-03"],
    ["3rd of May", "no-date"],
    ["May 3, 2031", "2031-05-03"],
    ["Sept 3 2031", "2031-09-03"],
    ["٢٠٣١-٠٥-٠٣", "2031-05-03"],
    // Both parts the same: no order changes the day.
    ["05/05/2031", "2031-05-05"],
    ["2028-02-29", "2028-02-29"],
  ])("%s: %s", (text, day) => {
    expect(told(text)).toBe(day);
  });

  // The calendar of spreadsheets: datetime(1899, 12, 30) + timedelta(days=45354.5) in Python is 2024-03-03 12:00.
  test.each([
    ["45354", "2024-03-03"],
    ["45354.5", "2024-03-03 12:00"],
    ["18264", "1950-01-01"],
    ["73415", "2100-12-31"],
    ["18263", "no-date"],
  ])("the day number %s: %s", (text, day) => {
    expect(told(text)).toBe(day);
  });
});

describe("times of day", () => {
  test.each([
    ["2031-05-03T14:30", "2031-05-03 14:30"],
    ["2031-05-03 14:30:05", "2031-05-03 14:30"],
    ["3.5.2031, 9:05", "2031-05-03 09:05"],
    ["3 May 2031 2:30 pm", "2031-05-03 14:30"],
    ["3 May 2031 12:10 am", "2031-05-03 00:10"],
    ["2031-05-03T14:30:00Z", "2031-05-03T14:30:00.000Z"],
    // 14:30 at +02:00 is 12:30 UTC; 00:30 at +05:45 is 18:45 UTC of the day before.
    ["2031-05-03T14:30:00+02:00", "2031-05-03T12:30:00.000Z"],
    ["2031-05-03T00:30+0545", "2031-05-02T18:45:00.000Z"],
    ["2031-05-03 25:00", "no-day"],
    ["2031-05-03 13:10 pm", "no-day"],
    ["14:30", "no-date"],
  ])("%s: %s", (text, moment) => {
    expect(told(text)).toBe(moment);
  });
});

describe("two numbers and a year", () => {
  test.each([
    ["03/04/2031", "2031-04-03 or 2031-03-04"],
    ["03/04/25", "2025-04-03 or 2025-03-04"],
    ["3-4-2031", "2031-04-03 or 2031-03-04"],
    ["25/03/2031", "2031-03-25 or no day"],
    ["03/25/2031", "no day or 2031-03-25"],
    ["03/04/2031 09:15", "2031-04-03 09:15 or 2031-03-04 09:15"],
  ])("%s: %s", (text, days) => {
    expect(told(text)).toBe(days);
  });
});

describe("what is no day", () => {
  test.each([
    ["31/02/2031", "no-day"],
    ["31.02.2031", "no-day"],
    ["2031-13-01", "no-day"],
    ["2031-02-29", "no-day"],
    ["0031-05-03", "no-day"],
    ["32/33/2031", "no-day"],
    ["", "empty"],
    ["  ", "empty"],
    ["Monday", "no-date"],
    ["3/5", "no-date"],
    ["3 May", "no-date"],
    ["x".repeat(9999), "no-date"],
  ])("%s: %s", (text, what) => {
    expect(told(text)).toBe(what);
  });
});
