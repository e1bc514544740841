import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { checkSeed, madeHereSeed, quotedSeed, seedNotes } from "#shared/draw/seed.ts";
import { Problem } from "#shared/problem.ts";

function refusal(text: string): Problem {
  try {
    checkSeed(text);
  } catch (error) {
    if (error instanceof Problem) return error;
    throw error;
  }
  throw new Error(`"${text}" was accepted`);
}

describe("a seed is text", () => {
  // As a JavaScript number 20237331128159211123 would print as 20237331128159210000.
  test.each([
    "2023733112815921112345678",
    "00031459265358979323",
    "0",
    "12 rolls of a die",
    "Ruß 鸟 🐦",
    "≥ 3 €",
    "a|b",
  ])("%s stays as it is", (seed) => expect(checkSeed(seed)).toBe(seed));

  // "e" with a combining acute accent (U+0065 U+0301) is the same text as "é" (U+00E9).
  test("letters typed in two parts become one", () => {
    expect(checkSeed("e\u0301tang")).toBe("\u00e9tang");
    expect(seedNotes("e\u0301tang")[0]).toMatch("joined");
  });

  test("plain spaces outside go, spaces inside stay", () => {
    expect(checkSeed("  spring  count ")).toBe("spring  count");
    expect(seedNotes(" spring count 2031")).toEqual(["Spaces before and after the seed were removed."]);
  });

  test.each([
    ["12\t34", 3, "a tab (U+0009)"],
    ["1234\u00a0", 5, "a no-break space (U+00A0)"],
    ["\u200b1234", 1, "a zero-width space (U+200B)"],
    ["🐦\n", 2, "a line break (U+000A)"],
    ["e\u0301\u2003x", 3, "another kind of space (U+2003)"],
    ["a\u202eb", 2, "an invisible character (U+202E)"],
    ["👩\u200d🌾", 2, "a zero-width joiner (U+200D)"],
    ["a\ud800", 2, "an invisible character (U+D800)"],
  ])("%j is refused with the place of what can't be seen", (text, place, name) => {
    const problem = refusal(text);
    expect(problem.code).toBe("seed-invalid");
    expect(problem.message).toContain(`Character ${place} of the seed is ${name}`);
  });

  test("an empty seed, or one of spaces, is refused", () => {
    expect(refusal("").message).toMatch("empty");
    expect(refusal("   ").message).toMatch("empty");
  });

  // Code points, not UTF-16 units: 200 birds are 400 units.
  test("200 characters are the most, and a bird is one", () => {
    expect(checkSeed("🐦".repeat(200))).toBe("🐦".repeat(200));
    expect(refusal("🐦".repeat(201)).message).toMatch("201 characters");
  });

  test("checking a checked seed changes nothing", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary", minLength: 1, maxLength: 30 }), (text) => {
        let seed: string;
        try {
          seed = checkSeed(text);
        } catch (error) {
          expect(error).toBeInstanceOf(Problem);
          return;
        }
        expect(checkSeed(seed)).toBe(seed);
      }),
      { numRuns: 500 },
    );
  });
});

describe("what is told about a seed", () => {
  test("a short seed is told to be short, twenty digits are not", () => {
    expect(seedNotes("42")).toEqual([expect.stringMatching("short")]);
    expect(seedNotes("73915228640139756052")).toEqual([]);
  });

  test("leading zeros are told to belong to it", () => {
    expect(seedNotes("07391522864013975605")).toEqual([expect.stringMatching("leading zeros")]);
  });

  test("a seed is shown between straight quotes", () => {
    expect(quotedSeed("07 a")).toBe('"07 a"');
  });
});

describe("a seed made here", () => {
  test("is twenty digits in the order of the source, leading zeros kept", () => {
    let calls = 0;
    expect(madeHereSeed((m) => (calls++ * 3) % m)).toBe("03692581470369258147");
    expect(calls).toBe(20);
  });

  test("a source that gives no digit is a bug and is told", () => {
    expect(() => madeHereSeed(() => 10)).toThrow("not a digit: 10");
  });
});
