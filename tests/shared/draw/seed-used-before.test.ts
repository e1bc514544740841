import { expect, test } from "vitest";
import { drawEntries } from "#shared/draw/draw.ts";
import { type EarlierDeclaration, seedUsedBefore } from "#shared/draw/seed-used-before.ts";
import { Problem } from "#shared/problem.ts";

const FRAME = "ab".repeat(32);
const OTHER_FRAME = "cd".repeat(32);

const earlier = (part: Partial<EarlierDeclaration>): EarlierDeclaration => ({
  frameSha256: FRAME,
  generator: "sha256-counter",
  seed: "00391522",
  drawNumber: 1,
  ...part,
});

const numbersOf = (found: readonly EarlierDeclaration[]) => found.map(({ drawNumber }) => drawNumber);

test("the same seed, frame and generator name the earlier draw, and the abandoned declaration too", () => {
  const all = [earlier({ drawNumber: 3 }), earlier({ drawNumber: null }), earlier({ drawNumber: 1 })];
  expect(numbersOf(seedUsedBefore(all, FRAME, "sha256-counter", "00391522"))).toEqual([3, null, 1]);
});

test("another frame, another generator or a declaration without a seed is no earlier use", () => {
  const all = [earlier({ frameSha256: OTHER_FRAME }), earlier({ generator: "arc4" }), earlier({ seed: null })];
  expect(seedUsedBefore(all, FRAME, "sha256-counter", "00391522")).toEqual([]);
});

// Outer spaces go and e + U+0301 is é (NFC), as in the seed that was stored; a leading zero makes another text.
test("what is typed is compared as it would be stored", () => {
  const all = [earlier({ seed: "étang 7" })];
  expect(numbersOf(seedUsedBefore(all, FRAME, "sha256-counter", "  e\u0301tang 7 "))).toEqual([1]);
  expect(seedUsedBefore([earlier({ seed: "42" })], FRAME, "sha256-counter", "042")).toEqual([]);
});

test("a seed that cannot be used is refused as when it is given", () => {
  expect(() => seedUsedBefore([], FRAME, "sha256-counter", "12\t34")).toThrow(Problem);
});

// What is said of such a seed: the shorter list is the beginning of the longer one; without replacement it is the same cells, each once.
test.each(["sha256-counter", "arc4"] as const)(
  "a seed used again with %s gives the same cells in order",
  (generator) => {
    const units = (kind: "srs-wr" | "srs-wor", n: number) =>
      (drawEntries({ sha256: FRAME, units: 40 }, { kind, n }, "00391522", generator, 0)[0]?.entries ?? []).map(
        ({ unit }) => unit,
      );
    const long = units("srs-wr", 30);
    expect(long).toHaveLength(30);
    expect(units("srs-wr", 12)).toEqual(long.slice(0, 12));
    const once = [...new Set(long)];
    expect(once.length).toBeLessThan(30);
    expect(units("srs-wor", once.length)).toEqual(once);
  },
);
