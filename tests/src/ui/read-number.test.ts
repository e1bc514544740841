import { describe, expect, it } from "vitest";
import { readNumber } from "../../../src/components/ui/read-number.ts";

describe("numbers as people type them", () => {
  it("reads point, comma, parted thousands and both signs", () => {
    expect(readNumber("20")).toBe(20);
    expect(readNumber(" 0.5 ")).toBe(0.5);
    expect(readNumber("1,5")).toBe(1.5);
    expect(readNumber("12.")).toBe(12);
    expect(readNumber(".5")).toBe(0.5);
    expect(readNumber("1\u202f234,5")).toBe(1234.5);
    expect(readNumber("\u22125")).toBe(-5);
    expect(readNumber("007")).toBe(7);
  });

  it("gives null, never a guess, for what is no number or could be two", () => {
    for (const text of [
      "",
      " ",
      "-",
      "1,500.5",
      "1.2.3",
      "1 2",
      "12 34",
      "1e3",
      "0x10",
      "twenty",
      "NaN",
      "Infinity",
      "5 m",
    ]) {
      expect(readNumber(text), text).toBeNull();
    }
  });
});
