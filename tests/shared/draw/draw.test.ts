import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { checkDesign, design, designNotes, reserveDefault, type Design } from "#shared/draw/design.ts";
import { distinctUnits, drawEntries, lengthenedReserves } from "#shared/draw/draw.ts";
import { GENERATORS } from "#shared/draw/generator.ts";
import { expectedDistinctCells } from "#shared/field/cells-to-visit.ts";
import { Problem } from "#shared/problem.ts";
import { designs, drawCases } from "./reference.ts";

const sha256 = "779dfb7bac671c5b00cb760fea9dbc9f45daccf6d44e3be1586bd94d86c5e90b";
const wholeFrame = (units: number) => ({ sha256, units });
const only = (lists: ReturnType<typeof drawEntries>) => {
  expect(lists.map((list) => list.stratum)).toEqual([""]);
  return lists[0]?.entries ?? [];
};

describe("simple random draws", () => {
  // Python, hashlib and an independent ARC4: units with replacement.
  test.each(drawCases.filter((one) => one.stratum === "" && one.generator !== "arc4-text"))(
    "$generator with and without replacement, seed $seed_as_typed, N = $N",
    (one) => {
      const { generator } = one;
      if (generator === "arc4-text") return;
      const frame = { sha256: one.frameSha256, units: one.N };
      const draw = (kind: Design["kind"], n: number) =>
        only(drawEntries(frame, { kind, n }, one.seed_as_typed, generator, 0)).map((entry) => entry.unit);
      expect(draw("srs-wr", one.n)).toEqual(one.units_with_replacement);
      expect(draw("srs-wor", one.units_without_replacement.length)).toEqual(one.units_without_replacement);
    },
  );

  // Another Python program: [stratum, order, unit, start, repeatOf, reserve].
  const simple = designs.cases.filter((one) => one.design === "srs-wr" || one.design === "srs-wor");
  test("the reference file holds sixteen simple draws with reserves", () => expect(simple).toHaveLength(16));
  test.each(simple)("$design on $frame with reserves, $generator, seed $seed", (one) => {
    const units = (designs.lists[one.frame] ?? "").trimEnd().split("\n").length;
    const wanted = design.parse({ kind: one.design, n: one.n });
    const got = only(drawEntries({ sha256: one.frameSha256, units }, wanted, one.seed, one.generator, one.reserves));
    expect(got).toEqual(
      one.order_unit.map(([, position, unit, , repeatOf, reserve]) => ({ position, unit, repeatOf, reserve })),
    );
  });
});

describe("what holds for every simple random draw", { timeout: 60_000 }, () => {
  const anyDraw = fc.record({
    units: fc.integer({ min: 1, max: 400 }),
    kind: fc.constantFrom("srs-wr" as const, "srs-wor" as const),
    n: fc.integer({ min: 1, max: 120 }),
    reserves: fc.integer({ min: 0, max: 30 }),
    generator: fc.constantFrom(...GENERATORS),
    seed: fc.stringMatching(/^[0-9]{1,25}$/),
  });
  const drawn = ({
    units,
    kind,
    n,
    reserves,
    generator,
    seed,
  }: typeof anyDraw extends fc.Arbitrary<infer T> ? T : never) => {
    fc.pre(kind === "srs-wr" || n + reserves <= units);
    return only(drawEntries(wholeFrame(units), { kind, n }, seed, generator, reserves));
  };

  test("every entry is in the frame, has its place, and points to the first entry of its cell", () => {
    fc.assert(
      fc.property(anyDraw, (settings) => {
        const entries = drawn(settings);
        expect(entries).toHaveLength(settings.n + settings.reserves);
        entries.forEach((entry, i) => {
          expect(entry.unit >= 1 && entry.unit <= settings.units && Number.isInteger(entry.unit)).toBe(true);
          const first = entries.findIndex((other) => other.unit === entry.unit);
          expect(entry).toMatchObject({
            position: i + 1,
            repeatOf: first === i ? null : first + 1,
            reserve: i >= settings.n,
          });
        });
      }),
    );
  });

  test("without replacement no cell comes twice", () => {
    fc.assert(
      fc.property(anyDraw, (settings) => {
        const entries = drawn({ ...settings, kind: "srs-wor" });
        expect(distinctUnits(entries)).toBe(entries.length);
      }),
    );
  });

  test("a longer list begins with the shorter one", () => {
    fc.assert(
      fc.property(anyDraw, fc.integer({ min: 1, max: 40 }), (settings, more) => {
        const shorter = drawn(settings);
        expect(drawn({ ...settings, reserves: settings.reserves + more }).slice(0, shorter.length)).toEqual(shorter);
      }),
    );
  });

  test("all cells without replacement are a complete count in random order", () => {
    const entries = only(drawEntries(wholeFrame(50), { kind: "srs-wor", n: 50 }, "42", "sha256-counter", 0));
    expect(entries.map((entry) => entry.unit).toSorted((a, b) => a - b)).toEqual(
      Array.from({ length: 50 }, (_, i) => i + 1),
    );
  });
});

describe("a draw as a whole", { timeout: 60_000 }, () => {
  // E[distinct] = N(1 − (1 − 1/N)ⁿ): 23.32, 55.78, 37.03, 48.79; four standard errors of the mean of 400 draws, whose
  // SD is below √(n²/2N) (number of repeats, nearly Poisson).
  test.each([
    [400, 24, 23.32],
    [400, 60, 55.78],
    [250, 40, 37.03],
    [1000, 50, 48.79],
  ])("N = %d and n = %d give %d different cells on the average", (units, n, expected) => {
    expect(expectedDistinctCells(units, n)).toBeCloseTo(expected, 2);
    const draws = 400;
    let sum = 0;
    for (let seed = 0; seed < draws; seed += 1) {
      sum += distinctUnits(
        only(drawEntries(wholeFrame(units), { kind: "srs-wr", n }, `seed ${seed}`, "sha256-counter", 0)),
      );
    }
    const standardError = Math.sqrt((n * n) / (2 * units) / draws);
    expect(Math.abs(sum / draws - expected)).toBeLessThan(4 * standardError);
  });

  test("a hundred thousand picks tell their progress and can be cancelled", () => {
    const seen: number[] = [];
    const entries = only(
      drawEntries(wholeFrame(10_000_000), { kind: "srs-wr", n: 100_000 }, "1", "sha256-counter", 0, (done, of) => {
        expect(of).toBe(100_000);
        seen.push(done);
      }),
    );
    expect(entries).toHaveLength(100_000);
    expect(seen.length).toBeGreaterThan(50);
    expect(seen.at(-1)).toBe(100_000);
    const stop = () => {
      throw new Problem("cancelled", "Stopped.");
    };
    expect(() => drawEntries(wholeFrame(10), { kind: "srs-wr", n: 5 }, "1", "arc4", 0, stop)).toThrow("Stopped.");
  });
});

describe("designs that can't be drawn", () => {
  test.each([
    [{ kind: "srs-wr", n: 0 }, 100, 0, "0 picks"],
    [{ kind: "srs-wr", n: 100_001 }, 100, 0, "100001 picks"],
    [{ kind: "srs-wr", n: 2.5 }, 100, 0, "2.5 picks"],
    [{ kind: "srs-wr", n: 5 }, 100, -1, "-1 reserves"],
    [{ kind: "srs-wor", n: 98 }, 100, 3, "need 101 different cells, and the frame has 100"],
    [{ kind: "srs-wor", n: 101 }, 100, 0, "need 101 different cells, and the frame has 100"],
  ] as const)("%o on %d units with %d reserves", (wanted, units, reserves, told) => {
    expect(() => checkDesign(wanted, units, reserves)).toThrow(Problem);
    expect(() => checkDesign(wanted, units, reserves)).toThrow(told);
    expect(() => drawEntries(wholeFrame(units), wanted, "1", "arc4", reserves)).toThrow(told);
  });

  test("the last cell without replacement can still be drawn", () => {
    expect(only(drawEntries(wholeFrame(100), { kind: "srs-wor", n: 97 }, "1", "arc4", 3))).toHaveLength(100);
  });

  test("a frame without units is a bug and is told", () => {
    expect(() => checkDesign({ kind: "srs-wr", n: 1 }, 0, 0)).toThrow(RangeError);
  });

  test("a design with a field that nobody knows is none", () => {
    expect(design.safeParse({ kind: "srs-wr", n: 3, strata: [] }).success).toBe(false);
    expect(design.safeParse({ kind: "haphazard", n: 3 }).success).toBe(false);
  });

  test("one pick, and as many picks as cells, are drawn and told", () => {
    expect(designNotes({ kind: "srs-wr", n: 1 }, 100)).toEqual([expect.stringMatching("no standard error")]);
    expect(designNotes({ kind: "srs-wr", n: 100 }, 100)).toEqual([expect.stringMatching("exact")]);
    expect(designNotes({ kind: "srs-wor", n: 100 }, 100)).toEqual([expect.stringMatching("complete count")]);
    expect(designNotes({ kind: "srs-wr", n: 60 }, 100)).toEqual([]);
  });
});

describe("how many reserves", () => {
  // A fifth of n, rounded up, at least 5.
  test.each([
    [1, 5],
    [25, 5],
    [26, 6],
    [60, 12],
    [100_000, 20_000],
  ])("%d picks are offered %d", (n, reserves) => expect(reserveDefault(n)).toBe(reserves));

  test("without replacement never more than there are cells left", () => {
    expect(reserveDefault(60, 3)).toBe(3);
    expect(reserveDefault(60, -1)).toBe(0);
  });

  test("a list is lengthened up to the frame's last cell and no further", () => {
    expect(lengthenedReserves({ kind: "srs-wr", n: 10 }, 12, 5)).toBe(5);
    expect(lengthenedReserves({ kind: "srs-wor", n: 10 }, 14, 9)).toBe(4);
    expect(lengthenedReserves({ kind: "srs-wor", n: 12 }, 12, 9)).toBe(0);
  });
});
