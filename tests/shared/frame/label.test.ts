import { expect, test } from "vitest";
import { cellLabel, columnLetters } from "#shared/frame/label.ts";

// As in spreadsheets: 26 one-letter columns, 26² two-letter, 26³ three-letter ones.
test("columns are A to Z, then AA to ZZ, then AAA, as on a map index", () => {
  expect([0, 25, 26, 27, 51, 52, 701, 702].map(columnLetters)).toEqual(["A", "Z", "AA", "AB", "AZ", "BA", "ZZ", "AAA"]);
});

test("the north-west corner is A1; row 27 of column 28 is AB27", () => {
  expect([cellLabel(0, 0), cellLabel(27, 26)]).toEqual(["A1", "AB27"]);
});

// 26 + 26² + 26³ + 26⁴ + 26⁵ = 12,356,630 columns have up to five letters; seven digits make twelve characters.
test("the last column with five letters is ZZZZZ", () => {
  expect(cellLabel(12_356_629, 9_999_998)).toBe("ZZZZZ9999999");
  expect(columnLetters(12_356_630)).toBe("AAAAAA");
});

test("a column or row before the corner has no label", () => {
  expect(() => cellLabel(-1, 0)).toThrow(RangeError);
  expect(() => cellLabel(0, -1)).toThrow(RangeError);
});
