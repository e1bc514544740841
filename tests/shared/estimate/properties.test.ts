import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { estimateFromCounts } from "#shared/estimate/from-counts.ts";
import { logNormalFactor, logNormalLimits } from "#shared/estimate/limits-log-normal.ts";
import { tLimits } from "#shared/estimate/limits-t.ts";
import { srsEstimate } from "#shared/estimate/simple-random.ts";
import { tQuantile } from "#shared/estimate/t-quantile.ts";
import { bounds, inputOf, numberOf } from "./builders.ts";

const count = fc.oneof(fc.nat(2000), fc.double({ min: 0, max: 1e6, noNaN: true, noDefaultInfinity: true }));
/** Picks of a frame of 60 units, repeats allowed, each unit with a count. */
const sample = fc.record({
  picks: fc.array(fc.integer({ min: 1, max: 60 }), { minLength: 2, maxLength: 40 }),
  counts: fc.array(count, { minLength: 60, maxLength: 60 }),
});
const countsOf = (counts: readonly number[]) => Object.fromEntries(counts.map((value, i) => [i + 1, value]));
const near = (got: number, wanted: number) =>
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(1e-9 * Math.abs(wanted));

describe("whatever was picked and counted", () => {
  test("lower ≤ estimate ≤ upper for both limits", () => {
    fc.assert(
      fc.property(sample, ({ picks, counts }) => {
        const { total } = estimateFromCounts(inputOf(picks, countsOf(counts), { units: 60 }));
        for (const limits of [total.limits.t, total.limits.logNormal]) {
          if (limits.kind === "none") continue;
          expect(limits.lower).toBeLessThanOrEqual(total.estimate);
          expect(limits.upper).toBeGreaterThanOrEqual(total.estimate);
        }
      }),
    );
  });

  test("total, error and limits grow with N; the mean doesn't", () => {
    fc.assert(
      fc.property(sample, ({ picks, counts }) => {
        const one = estimateFromCounts(inputOf(picks, countsOf(counts), { units: 60 }));
        const ten = estimateFromCounts(inputOf(picks, countsOf(counts), { units: 600 }));
        near(ten.total.estimate, 10 * one.total.estimate);
        near(numberOf(ten.total.standardError), 10 * numberOf(one.total.standardError));
        expect(ten.mean).toEqual(one.mean);
        if (one.total.limits.logNormal.kind === "none") return;
        near(bounds(ten.total.limits.logNormal).upper, 10 * bounds(one.total.limits.logNormal).upper);
      }),
    );
  });

  test("the order of the picks changes nothing", () => {
    fc.assert(
      fc.property(sample, fc.infiniteStream(fc.nat()), ({ picks, counts }, keys) => {
        const input = inputOf(picks, countsOf(counts), { units: 60 });
        const shuffled = input.picks
          .map((pick) => ({ pick, key: Number(keys.next().value) }))
          .sort((a, b) => a.key - b.key)
          .map(({ pick }) => pick);
        expect(estimateFromCounts({ ...input, picks: shuffled })).toEqual(estimateFromCounts(input));
      }),
    );
  });

  test("a result is JSON: nothing is lost by writing it down", () => {
    fc.assert(
      fc.property(sample, ({ picks, counts }) => {
        const result = estimateFromCounts(inputOf(picks, countsOf(counts), { units: 60, areaM2: 1234.5 }));
        expect(JSON.parse(JSON.stringify(result))).toEqual(result);
      }),
    );
  });
});

/** A small generator for this file: 32-bit xorshift, fixed seed. */
function uniform(seed: number): () => number {
  let state = seed;
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return ((state >>> 0) + 0.5) / 2 ** 32;
  };
}

/** Negative binomial counts of a mean and clumping k, by walking the distribution from P(0) = (k/(k + mean))^k. */
function negativeBinomial(mean: number, k: number, random: () => number): number {
  const ratio = mean / (k + mean);
  let chance = (k / (k + mean)) ** k;
  let below = chance;
  let value = 0;
  const target = random();
  while (target > below && value < 10_000) {
    value += 1;
    chance *= ((k + value - 1) / value) * ratio;
    below += chance;
  }
  return value;
}

// Outside source: coverage from 20 000 NumPy samples (Monte Carlo standard error 0.2 points): (mean 8, k 2, n 20) 93.5 / 94.3 %
// for t / log-normal limits, (2, 0.3, 20) 86.3 / 90.5 %. 4 000 samples here add 0.4 to 0.55 points; three standard errors of both.
describe("how often nominal 95 % limits hold the truth, clumped counts drawn with replacement", () => {
  test.each([
    [8, 2, 20, 93.5, 94.3, 1.4],
    [2, 0.3, 20, 86.3, 90.5, 1.8],
  ])(
    "mean %s, k %s, n %s: in %s of 100 by t, %s by log-normal limits",
    (mean, k, n, tWanted, logNormalWanted, allowed) => {
      const random = uniform(20_311_203);
      const samples = 4000;
      const t = tQuantile(0.95, n - 1);
      const held = { t: 0, logNormal: 0 };
      for (let i = 0; i < samples; i += 1) {
        const values = Array.from({ length: n }, () => negativeBinomial(mean, k, random));
        const sample = srsEstimate({ design: "srs-wr", units: 1000, values, distinct: n });
        const error = numberOf(sample.standardErrorOfMean);
        // An all-zero sample holds nothing: a miss.
        if (error === 0) continue;
        const limits = {
          t: tLimits(sample.mean, error, t),
          logNormal: logNormalLimits(sample.mean, logNormalFactor(error / sample.mean, t)),
        };
        for (const kind of ["t", "logNormal"] as const) {
          const found = limits[kind];
          if (found.kind === "interval" && found.lower <= mean && mean <= found.upper) held[kind] += 1;
        }
      }
      expect(Math.abs((100 * held.t) / samples - tWanted)).toBeLessThan(allowed);
      expect(Math.abs((100 * held.logNormal) / samples - logNormalWanted)).toBeLessThan(allowed);
    },
  );
});
