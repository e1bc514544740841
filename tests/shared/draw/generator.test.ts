import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, hexToBytes, utf8ToBytes } from "@noble/hashes/utils.js";
import fc from "fast-check";
import seedrandom from "seedrandom";
import { describe, expect, test } from "vitest";
import { GENERATORS, arc4, generatorNamed, remainderOf, sha256Counter, streamText } from "#shared/draw/generator.ts";
import { checkSeed } from "#shared/draw/seed.ts";
import { Problem } from "#shared/problem.ts";
import { drawCases, hashes, seedrandomValues } from "./reference.ts";

const frameSha256 = "779dfb7bac671c5b00cb760fea9dbc9f45daccf6d44e3be1586bd94d86c5e90b";

describe("the parts the generators rest on", () => {
  // FIPS 180 vectors; "a x 1000000" stands for one million letters a.
  test.each(hashes.published_vectors)("SHA-256 of the published message $message", ({ message, sha256: digest }) => {
    const text = message === "a x 1000000" ? "a".repeat(1_000_000) : message;
    expect(bytesToHex(sha256(utf8ToBytes(text)))).toBe(digest);
  });

  // Digest → index by Python's whole numbers, for N from 1 to beyond 2³².
  test("the remainder of a digest is that of the whole 256-bit number", () => {
    for (const { message, N, sha256: digest, index } of hashes.rows) {
      expect(bytesToHex(sha256(utf8ToBytes(message)))).toBe(digest);
      expect(remainderOf(hexToBytes(digest), N) + 1).toBe(index);
    }
  });

  // BigInt is the outside computation here, on both sides of the change at 2³⁷.
  test("the remainder equals BigInt's for every modulus up to 2⁵³ − 1", () => {
    fc.assert(
      fc.property(
        fc.uint8Array({ minLength: 32, maxLength: 32 }),
        fc.oneof(
          fc.integer({ min: 1, max: 1000 }),
          fc.maxSafeNat().map((m) => Math.max(1, m)),
          fc.constantFrom(2 ** 37, 2 ** 37 + 1, 2 ** 53 - 1),
        ),
        (digest, m) => {
          expect(remainderOf(digest, m)).toBe(Number(BigInt(`0x${bytesToHex(digest)}`) % BigInt(m)));
        },
      ),
    );
  });

  // First values and ⌊100·value⌋ + 1 of the package, recorded on Node and confirmed in Python.
  test.each(seedrandomValues)("the package's default generator gives its recorded values for $seed", (recorded) => {
    const values = seedrandom(recorded.seed);
    expect(recorded.first10.map(() => values())).toEqual(recorded.first10);
    const again = seedrandom(recorded.seed);
    expect(recorded.draws_N100_floor.map(() => Math.floor(again() * 100) + 1)).toEqual(recorded.draws_N100_floor);
  });
});

describe("the streams", () => {
  test("the text of a stream names version, frame, seed and stratum", () => {
    expect(streamText(frameSha256, "042", "dune")).toBe(`quillet-draw/1|${frameSha256}|042|dune`);
  });

  test.each(drawCases.filter((one) => one.generator !== "arc4-text"))(
    "$generator, seed $seed_as_typed, stratum '$stratum', N = $N as computed in Python",
    (one) => {
      if (one.generator === "arc4-text") return;
      const seed = checkSeed(one.seed_as_typed);
      expect(seed).toBe(one.seed_normalised);
      const generator = generatorNamed(one.generator, one.frameSha256, seed, one.stratum);
      expect(generator.name).toBe(one.generator);
      expect(one.units_with_replacement.map(() => generator.next(one.N) + 1)).toEqual(one.units_with_replacement);
    },
  );

  // The third generator of the reference file is seeded with the text itself, as the product's is not.
  test("arc4 is seeded with the hash of the text, not with the text", () => {
    const textSeeded = drawCases.filter((one) => one.generator === "arc4-text" && one.N === 65536);
    expect(textSeeded.length).toBeGreaterThan(10);
    for (const one of textSeeded) {
      const generator = arc4(one.frameSha256, one.seed_normalised, one.stratum);
      expect(one.units_with_replacement.map(() => generator.next(one.N) + 1)).not.toEqual(one.units_with_replacement);
    }
  });

  // The cyclic key of that generator gives "42" and "4242" one stream; the hash before it keeps them apart.
  test.each(GENERATORS)("%s gives the seeds 42 and 4242 different streams", (name) => {
    const [a, b] = ["42", "4242"].map((seed) => generatorNamed(name, frameSha256, seed, ""));
    const firstTen = (generator = a) => Array.from({ length: 10 }, () => generator?.next(1_000_000));
    expect(firstTen(a)).not.toEqual(firstTen(b));
  });

  // Seeds are text: a number would lose the zero.
  test.each(GENERATORS)("%s gives the seeds 7 and 07 different streams", (name) => {
    const next = (seed: string) => generatorNamed(name, frameSha256, seed, "").next(2 ** 40);
    expect(next("7")).not.toBe(next("07"));
  });

  test.each(GENERATORS)("%s gives whole numbers from 0 to m − 1 and repeats itself", (name) => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 2 ** 40 }), fc.stringMatching(/^[a-z0-9]{1,20}$/), (m, seed) => {
        const [a, b] = [generatorNamed(name, frameSha256, seed, ""), generatorNamed(name, frameSha256, seed, "")];
        for (let i = 0; i < 20; i += 1) {
          const value = a.next(m);
          expect(Number.isSafeInteger(value) && value >= 0 && value < m).toBe(true);
          expect(b.next(m)).toBe(value);
        }
      }),
      { numRuns: 50 },
    );
  });

  test("two streams in turn do not disturb each other", () => {
    const alone = sha256Counter(frameSha256, "one", "");
    const expected = [alone.next(1e6), alone.next(1e6), alone.next(1e6)];
    const one = sha256Counter(frameSha256, "one", "");
    const other = sha256Counter(frameSha256, "another", "");
    expect([one.next(1e6), other.next(1e6) && one.next(1e6), other.next(1e6) && one.next(1e6)]).toEqual(expected);
  });

  test("arc4 refuses to choose among 2⁵² numbers and sha256-counter does not", () => {
    expect(() => arc4(frameSha256, "1", "").next(2 ** 52)).toThrow(Problem);
    expect(arc4(frameSha256, "1", "").next(2 ** 52 - 1)).toBeLessThan(2 ** 52);
    expect(sha256Counter(frameSha256, "1", "").next(2 ** 53 - 1)).toBeLessThan(2 ** 53);
  });

  test.each([0, -1, 1.5, Number.NaN, 2 ** 53])("a modulus of %s is a bug and is told", (m) => {
    expect(() => sha256Counter(frameSha256, "1", "").next(m)).toThrow(RangeError);
    expect(() => arc4(frameSha256, "1", "").next(m)).toThrow(RangeError);
  });

  test("a frame's hash that is none is a bug and is told", () => {
    expect(() => sha256Counter(frameSha256.toUpperCase(), "1", "")).toThrow("not a SHA-256");
  });
});
