import { describe, expect, test } from "vitest";
import { guessColumns } from "#shared/counts/guess-columns.ts";
import { mangledAs } from "#shared/counts/mangled-label.ts";

describe("labels that a spreadsheet changed", () => {
  test.each([
    ["3-Mar", "a date"],
    ["Mar-03", "a date"],
    ["2031-03-03", "a date"],
    ["03/03/2031", "a date"],
    ["45354", "a day number"],
    ["1E5", "an exponent"],
    ["1.00E+05", "an exponent"],
    ["F19", "no"],
    ["AB27", "no"],
    ["123", "no"],
    ["99999", "no"],
  ])("the label %s: %s", (label, what) => {
    expect(mangledAs(label)).toBe(what);
  });
});

describe("which column is what", () => {
  const known = { units: new Set([434, 65, 301]), labels: new Set(["F19", "V5", "Z14"]) };

  test("names of the trade are known, places in the draw are not taken for cells", () => {
    const header = ["Draw order", "Unit", "Quadrat", "Spikes", "Status", "Remarks", "Who", "Date", "Acc"];
    const rows = [["1", "434", "F19", "4", "", "", "JS", "3/7", "2.1"]];
    expect(guessColumns(header, rows, known, ["marsh-orchid spikes", "spikes"])).toEqual({
      unit: 1,
      label: 2,
      count: 3,
      state: 4,
      note: 5,
      observer: 6,
      date: 7,
    });
  });

  test("without names the contents decide", () => {
    const header = ["column 1", "column 2", "column 3"];
    const rows = [
      ["F19", "ok", "4"],
      ["V5", "ok", "0"],
    ];
    expect(guessColumns(header, rows, known)).toMatchObject({ label: 0, count: 2, unit: -1 });
  });

  test("the place in the draw is never taken for a count", () => {
    const rows = [
      ["1", "F19", "4"],
      ["2", "V5", "0"],
    ];
    expect(guessColumns(["Draw order", "Cell", "x"], rows, known)).toMatchObject({ label: 1, count: 2 });
  });

  test("a plot column that holds unit numbers is the unit column", () => {
    const rows = [
      ["434", "4"],
      ["65", "0"],
    ];
    expect(guessColumns(["Plot", "Count"], rows, known)).toMatchObject({ unit: 0, label: -1, count: 1 });
  });
});
