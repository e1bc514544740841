import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { estimateFromCounts } from "#shared/estimate/from-counts.ts";
import { allZeroLimits } from "#shared/estimate/limits-all-zero.ts";
import { tQuantile } from "#shared/estimate/t-quantile.ts";
import type { Quantity } from "#shared/estimate/result.ts";
import { bounds, inputOf, numberOf } from "./builders.ts";

interface ReferenceQuantity {
  readonly estimate: number;
  readonly se: number | null;
  readonly cv: number | null;
  readonly df: number;
  readonly ci: Readonly<Record<string, Readonly<Record<string, number | null>>>>;
}
interface DataSet {
  readonly id: string;
  readonly design: string;
  readonly N: number;
  readonly n: number;
  readonly cell_area_ha: number;
  readonly cells: readonly string[] | null;
  readonly y: readonly number[];
  readonly sample_mean: number;
  readonly sample_var: number | null;
  readonly mean: ReferenceQuantity;
  readonly total: ReferenceQuantity;
  readonly density_per_ha: ReferenceQuantity;
  readonly ci: Readonly<Record<string, Readonly<Record<string, number>>>>;
}
const folder = new URL("../../reference/estimators/", import.meta.url);
const { datasets } = JSON.parse(readFileSync(new URL("estimators.json", folder), "utf8")) as { datasets: DataSet[] };

const close = (got: number, wanted: number | null | undefined, tolerance = 1e-9) => {
  if (typeof wanted !== "number") throw new Error("the reference has no value here");
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(tolerance * Math.max(1e-300, Math.abs(wanted)));
};

const DESIGNS: Record<string, "srs-wr" | "srs-wor"> = {
  srs_with_replacement: "srs-wr",
  srs_without_replacement: "srs-wor",
};
const simple = datasets.filter((set) => set.design in DESIGNS);

function estimateOf(set: DataSet, level: number) {
  const names = set.cells ?? set.y.map((_, i) => `cell ${i}`);
  const units = names.map((name) => names.indexOf(name) + 1);
  const counts = Object.fromEntries(units.map((unit, i) => [unit, set.y[i] ?? Number.NaN]));
  const areaM2 = set.N * set.cell_area_ha * 10_000;
  const design = DESIGNS[set.design] ?? "srs-wr";
  return estimateFromCounts(inputOf(units, counts, { design, units: set.N, areaM2, level }));
}

function expectQuantity(got: Quantity, wanted: ReferenceQuantity, level: string) {
  close(got.estimate, wanted.estimate);
  if (wanted.se === null) {
    expect(got.standardError).toEqual({ kind: "none", why: "one-pick" });
    return;
  }
  close(numberOf(got.standardError), wanted.se);
  if (got.limits.t.kind === "none") {
    // The reference writes 0 … 0 where nothing varies; here that is no pair of limits.
    expect(wanted.se).toBe(0);
    return;
  }
  const ci = wanted.ci[level];
  close(bounds(got.limits.t).lower, ci?.["t_lower"]);
  close(bounds(got.limits.t).upper, ci?.["t_upper"]);
  // Where the CV is 3e-9 R's log(1 + cv²) is log(1): the limits of the reference are the estimate. A test of its own below.
  if (ci?.["C"] === 1 && wanted.se > 0) return;
  close(bounds(got.limits.logNormal).lower, ci?.["ln_lower"]);
  close(bounds(got.limits.logNormal).upper, ci?.["ln_upper"]);
}

// Outside source: R 4.2.2, closed forms asserted equal to svymean / svytotal of the survey package.
describe("simple random data sets computed in R", () => {
  test("there are eleven of them, with replacement and without", () => {
    expect(simple.map((set) => set.id)).toHaveLength(11);
  });

  describe.each(simple.map((set) => [set.id, set] as const))("%s", (_, set) => {
    test.each(["0.80", "0.90", "0.95", "0.99"])(
      "mean, total and density, errors and limits agree to 1e-9 at level %s",
      (level) => {
        const got = estimateOf(set, Number(level));
        expect(got.picksCounted).toBe(set.n);
        expect(got.degreesOfFreedom).toBe(set.n - 1);
        if (set.sample_var === null) expect(got.sampleVariance).toEqual({ kind: "none", why: "one-pick" });
        else close(numberOf(got.sampleVariance), set.sample_var);
        expectQuantity(got.mean, set.mean, level);
        expectQuantity(got.total, set.total, level);
        if (got.density.kind === "none") throw new Error("there is an area");
        expectQuantity(got.density, set.density_per_ha, level);
        if (set.total.cv !== null) close(numberOf(got.coefficientOfVariation), set.total.cv);
      },
    );
  });

  // Outside source: mpmath 1.2.1 at 40 digits, 1000000010 / exp(t·√log1p(cv²)) = 1000000001.284511890715571…
  test("a tiny CV doesn't vanish in the log-normal factor", () => {
    const set = simple.find(({ id }) => id === "srswr-large-numbers");
    if (set === undefined) throw new Error("the set is there");
    close(bounds(estimateOf(set, 0.95).mean.limits.logNormal).lower, 1000000001.2845118907, 1e-14);
  });

  // In the set B7 stands three times and C2 twice: three picks more than cells.
  test("repeats are counted as picks and told apart from cells", () => {
    const set = simple.find(({ id }) => id === "srswr-duplicates");
    if (set?.cells === null || set === undefined) throw new Error("the set is there, with its cells");
    const got = estimateOf(set, 0.95);
    expect(got.picksCounted - got.distinctCells).toBe(3);
    expect(got.distinctCells).toBe(new Set(set.cells).size);
  });
});

describe("all zero", () => {
  const zero = datasets.find(({ id }) => id === "poisson-zero-12");
  // Outside source: R's poisson.test, 0 objects in 12 cells of 300.
  test.each(["0.80", "0.90", "0.95", "0.99"])("the upper limits of the total are R's at level %s", (level) => {
    const got = allZeroLimits(300, 12, Number(level));
    close(got.twoSided, zero?.ci[level]?.["two_sided_upper_total"]);
    close(got.oneSided, zero?.ci[level]?.["one_sided_upper_total"]);
  });

  // Textbook constants: 2.996 and 3.689 per cell counted at 95 %.
  test("with one cell of one the limits are 2.996 and 3.689", () => {
    const got = allZeroLimits(1, 1, 0.95);
    expect(got.oneSided).toBeCloseTo(2.9957, 4);
    expect(got.twoSided).toBeCloseTo(3.6889, 4);
  });
});

// Outside source: mpmath, 40-digit root of the incomplete beta function.
describe("Student t quantiles", () => {
  const lines = readFileSync(new URL("t_quantiles.csv", folder), "utf8").trim().split("\n").slice(1);
  const levels = (lines[0] ?? "")
    .split(",")
    .slice(1)
    .map((name) => Number(name.replace("level_", "")));
  const rows = lines.slice(1).map((line) => line.split(",").map(Number));

  test("the table holds 8 levels and degrees of freedom with fractions", () => {
    expect(levels).toEqual([0.5, 0.68, 0.8, 0.9, 0.95, 0.98, 0.99, 0.999]);
    expect(rows.length).toBeGreaterThanOrEqual(130);
    expect(rows.filter(([df]) => !Number.isInteger(df))).toHaveLength(8);
  });

  test("all agree to 1e-12", () => {
    for (const [degreesOfFreedom = Number.NaN, ...wanted] of rows) {
      wanted.forEach((value, i) => close(tQuantile(levels[i] ?? Number.NaN, degreesOfFreedom), value, 1e-12));
    }
  });

  test("no degrees of freedom is a mistake of the caller", () => {
    expect(() => tQuantile(0.95, 0)).toThrow("degrees of freedom are above 0, got 0");
  });
});
