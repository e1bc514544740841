import { describe, expect, test } from "vitest";
import { STATE_WORDS, closes, countWords, saySame, valueOf, type CellCount } from "#shared/counts/count.ts";
import { readCountText } from "#shared/counts/read-count-text.ts";
import { readStateText } from "#shared/counts/read-state-text.ts";

const kindOf = (text: string, rules = {}) => {
  const reading = readCountText(text, rules);
  return reading.kind === "refused" ? reading.why : reading.kind === "question" ? reading.ask : reading.kind;
};

describe("a text is read as a number", () => {
  test.each([
    ["0", 0],
    ["12", 12],
    ["007", 7],
    ["2.5", 2.5],
    ["1e3", 1000],
    ["1E3", 1000],
    ["12 000", 12_000],
    ["12\u00a0000", 12_000],
    ["12\u202f000", 12_000],
    ["12\u2009000", 12_000],
    ["1 234 567.5", 1_234_567.5],
    ["12'000", 12_000],
    ["1,234,567", 1_234_567],
    ["1.234.567", 1_234_567],
    ["1.234,5", 1234.5],
    ["1,234.5", 1234.5],
    ["10,5", 10.5],
    ["0,125", 0.125],
    [" 5 ", 5],
    ["\u200b5\ufeff", 5],
    ["zero", 0],
    // Arabic-Indic, Extended Arabic-Indic, Devanagari and full-width digits, and the Arabic decimal sign.
    ["١٢", 12],
    ["۱۲", 12],
    ["१२", 12],
    ["１２", 12],
    // Five mathematical alphabets stand in one run of digits: these are double-struck.
    ["𝟙𝟚", 12],
    ["١٢٫٥", 12.5],
  ])("“%s” is %s", (text, value) => {
    expect(readCountText(text)).toEqual({ kind: "value", value });
  });
});

describe("a text without a count is never a zero", () => {
  test.each(["", "  ", "-", "–", "—", ".", "n/a", "N/A", "na", "#N/A", "…"])("“%s” is no count", (text) => {
    expect(readCountText(text)).toEqual({ kind: "empty", sign: text.trim() });
  });

  test.each(["nil", "None", "NULL", "nothing", "absent"])("“%s” is asked about", (text) => {
    expect(readCountText(text)).toMatchObject({ kind: "question", ask: "zero-word", ifYes: 0 });
  });

  test("after a yes the word is a zero, and other words are still asked", () => {
    expect(readCountText("Nil", { zeroWords: ["nil"] })).toEqual({ kind: "value", value: 0 });
    expect(kindOf("none", { zeroWords: ["nil"] })).toBe("zero-word");
  });
});

describe("what is no count is refused by its kind", () => {
  test.each([
    ["-3", "negative"],
    ["−3", "negative"],
    ["–2,5", "negative"],
    [">50", "bound"],
    ["<5", "bound"],
    ["≥ 50", "bound"],
    ["50+", "bound"],
    ["at least 50", "bound"],
    ["10–12", "range"],
    ["10-12", "range"],
    ["10 to 12", "range"],
    ["10/12", "range"],
    ["c. 30", "approximate"],
    ["ca 30", "approximate"],
    ["~30", "approximate"],
    ["about 30", "approximate"],
    ["3?", "doubtful"],
    ["?", "doubtful"],
    ["5+2", "sum"],
    ["3 x 4", "sum"],
    ["TNTC", "uncounted-many"],
    ["many", "uncounted-many"],
    ["+++", "uncounted-many"],
    ["3-Mar", "date"],
    ["03/07/31", "date"],
    ["1e13", "too-large"],
    ["1e999", "too-large"],
    ["NaN", "no-number"],
    ["Infinity", "no-number"],
    ["1 2", "no-number"],
    ["5 spikes", "no-number"],
    ["=1+1", "no-number"],
    ["TRUE", "no-number"],
    ["½", "no-number"],
    ["1".repeat(61), "no-number"],
  ])("“%s” is refused: %s", (text, why) => {
    const reading = readCountText(text);
    expect(reading).toMatchObject({ kind: "refused", why });
    if (reading.kind === "refused") expect(reading.message).toMatch(/\.$/);
  });
});

describe("what only a person can settle is asked", () => {
  test("a fraction, where the target is counted in whole numbers", () => {
    expect(kindOf("2.5")).toBe("value");
    expect(kindOf("2.5", { wholeNumbers: true })).toBe("fraction");
    expect(kindOf("2.0", { wholeNumbers: true })).toBe("value");
    expect(kindOf("2.5", { wholeNumbers: true, fractionsMeant: true })).toBe("value");
  });

  // 12,345 is twelve and a third here, twelve thousand there.
  test("a comma with three digits behind it", () => {
    expect(readCountText("12,345")).toMatchObject({ kind: "question", ask: "comma", ifYes: 12_345 });
  });
});

describe("states", () => {
  test("a state in place of a number is that state", () => {
    expect(readCountText("Refused")).toEqual({ kind: "state", state: "refused" });
    expect(readCountText("not reached")).toEqual({ kind: "state", state: "not-reached" });
  });

  test("each state's own words and its code are read back as that state", () => {
    for (const [state, words] of Object.entries(STATE_WORDS)) {
      expect(readStateText(words)).toBe(state);
      expect(readStateText(state)).toBe(state);
      expect(readStateText(words.toUpperCase())).toBe(state);
    }
    expect(readStateText("constructor")).toBe("unknown");
  });

  test("only counted and not in the population bring a number", () => {
    const states: CellCount[] = [
      { state: "counted", value: 0 },
      { state: "not-in-population" },
      { state: "refused" },
      { state: "unsafe" },
      { state: "not-reached" },
      { state: "lost" },
      { state: "not-visited" },
    ];
    expect(states.map((count) => valueOf(count).known)).toEqual([true, true, false, false, false, false, false]);
    expect(states.map((count) => closes(count.state))).toEqual([false, false, true, true, true, true, false]);
    expect(states.map(countWords)).toEqual([
      "zero",
      "not in the population",
      "refused",
      "unsafe",
      "not reached",
      "lost",
      "not visited yet",
    ]);
  });

  test("zero and not visited yet are not the same", () => {
    expect(saySame({ state: "counted", value: 0 }, { state: "not-visited" })).toBe(false);
    expect(saySame({ state: "counted", value: 0 }, { state: "counted", value: 0 })).toBe(true);
    expect(saySame({ state: "refused", reason: "a" }, { state: "refused", reason: "b" })).toBe(true);
  });
});
