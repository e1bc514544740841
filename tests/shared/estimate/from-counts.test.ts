import { describe, expect, test } from "vitest";
import { estimateFromCounts } from "#shared/estimate/from-counts.ts";
import { areaSpokenForM2 } from "#shared/estimate/density.ts";
import { estimateNotes } from "#shared/estimate/notes.ts";
import { carefulSum, moments } from "#shared/estimate/moments.ts";
import { srsEstimate } from "#shared/estimate/simple-random.ts";
import { bounds, inputOf, numberOf, valuesOf } from "./builders.ts";

const keys = (result: Parameters<typeof estimateNotes>[0]) => estimateNotes(result).map((note) => note.key);

describe("mean and variance", () => {
  // By hand: the mean is 10⁹ + 1, the distances −1, 0, 1, so s² = 2/2 = 1.
  test("a billion and a little keep their variance to 1e-12", () => {
    const { mean, variance } = moments([1e9, 1e9 + 1, 1e9 + 2]);
    expect(mean).toBe(1e9 + 1);
    expect(Math.abs(Number(variance) - 1)).toBeLessThanOrEqual(1e-12);
  });

  // By hand: nine times 0.1 have the mean 0.1 and no variance, whatever the sum 0.9 rounds to.
  test("equal values have a variance of exactly 0", () => {
    expect(moments(Array<number>(9).fill(0.1)).variance).toBe(0);
    expect(moments(Array<number>(7).fill(1e12 / 3)).variance).toBe(0);
  });

  // By hand: 10¹⁶ + 1 rounds to 10¹⁶, and a plain sum would give 0.
  test("no value is lost where large and small are added", () => {
    expect(carefulSum([1e16, 1, -1e16])).toBe(1);
    expect(moments([5]).variance).toBe("undefined");
    expect(() => moments([])).toThrow("at least one value");
    expect(() => moments([1, Number.NaN])).toThrow("finite values, got NaN");
  });
});

describe("by hand: N = 50, picks 4, 0, 7, 4 (the first cell again), 1", () => {
  const result = estimateFromCounts(inputOf([11, 12, 13, 11, 14], { 11: 4, 12: 0, 13: 7, 14: 1 }));

  // ȳ = 16/5 = 3.2; Σ(y − ȳ)² = 0.64 + 10.24 + 14.44 + 0.64 + 4.84 = 30.8, s² = 7.7; SE = √(7.7/5) = 1.24097.
  test("mean 3.2, variance 7.7, standard error 1.24097, total 160 with 62.048", () => {
    expect(result.mean.estimate).toBeCloseTo(3.2, 12);
    expect(numberOf(result.sampleVariance)).toBeCloseTo(7.7, 12);
    expect(numberOf(result.mean.standardError)).toBeCloseTo(1.24097, 5);
    expect(result.total.estimate).toBeCloseTo(160, 10);
    expect(numberOf(result.total.standardError)).toBeCloseTo(62.048, 3);
  });

  // t with 4 degrees of freedom is 2.7764, so the half width is 172.27 and the lower limit 160 − 172.27 < 0.
  test("the t half width is 172.27 and reaches below zero, which is said", () => {
    const { lower, upper } = bounds(result.total.limits.t);
    expect((upper - lower) / 2).toBeCloseTo(172.27, 2);
    expect(lower).toBeLessThan(0);
    expect(keys(result)).toContain("t-below-zero");
  });

  // Distinct cells: 4 + 0 + 7 + 1 = 12 were seen, in 4 cells. The sum over distinct cells by n would give 120.
  test("a repeat enters as often as it was picked, and is seen once", () => {
    expect(result).toMatchObject({ picksCounted: 5, distinctCells: 4, cellsInUse: 4, seen: 12 });
    expect(result.total.estimate).not.toBeCloseTo(120, 6);
    expect(keys(result)).toContain("repeats");
  });
});

describe("precision that can't be had", () => {
  // One value has no variance: N·4 = 200 and nothing else.
  test("one pick gives a mean and no limits", () => {
    const result = valuesOf([4]);
    expect(result.total.estimate).toBe(200);
    expect(result.total.standardError).toEqual({ kind: "none", why: "one-pick" });
    expect(result.total.limits.logNormal).toEqual({ kind: "none", why: "one-pick" });
    expect(keys(result)).toContain("one-pick");
  });

  test("equal counts show no variation and have no limits", () => {
    const result = valuesOf([3, 3, 3, 3]);
    expect(result.total.standardError).toEqual({ kind: "known", value: 0 });
    expect(result.total.limits.t).toEqual({ kind: "none", why: "no-variation" });
    expect(result.total.limits.logNormal).toEqual({ kind: "none", why: "no-variation" });
    expect(keys(result)).toContain("no-variation");
  });

  // m counts cells: six picks of five cells, N = 50: 50·(−ln 0.05)/5 = 29.957 and 50·(−ln 0.025)/5 = 36.889.
  test("only zeros give upper limits from the distinct cells", () => {
    const result = estimateFromCounts(inputOf([1, 2, 3, 4, 5, 1], { 1: 0, 2: 0, 3: 0, 4: 0, 5: 0 }));
    expect(result.total.limits.t).toEqual({ kind: "none", why: "all-zero" });
    expect(result.coefficientOfVariation).toEqual({ kind: "none", why: "mean-zero" });
    if (result.allZero.kind !== "all-zero") throw new Error("all are zero");
    expect(result.allZero.cells).toBe(5);
    expect(result.allZero.oneSided).toBeCloseTo(29.957, 3);
    expect(result.allZero.twoSided).toBeCloseTo(36.889, 3);
  });

  // With replacement all three units of N = 3 were picked: that none is there is seen, not bounded.
  test("only zeros in every cell of the frame need no upper limit", () => {
    const result = valuesOf([0, 0, 0], { units: 3 });
    expect(result.allZero).toEqual({ kind: "not-needed" });
    expect(keys(result)).toContain("all-seen");
  });

  // cv = 0.25 and t = 1.96 give C = exp(1.96·√ln 1.0625) = 1.6203 (a published table: 1 000 reads 617 to 1 620).
  test("the log-normal factor at a CV of 25 % is 1.6203", async () => {
    const { logNormalFactor, logNormalLimits } = await import("#shared/estimate/limits-log-normal.ts");
    const factor = logNormalFactor(0.25, 1.959963985);
    expect(numberOf(factor)).toBeCloseTo(1.6203, 4);
    const { lower, upper } = bounds(logNormalLimits(1000, factor));
    expect([Math.round(lower), Math.round(upper)]).toEqual([617, 1620]);
  });

  // t with 1 degree of freedom at 99.99 % is 6 366.2, and exp(6 366·√ln 2) passes the largest double.
  test("limits beyond every number are none, not infinity", () => {
    const result = valuesOf([0, 5], { level: 0.9999 });
    expect(result.total.limits.logNormal).toEqual({ kind: "none", why: "too-wide" });
    expect(JSON.stringify(result)).not.toContain("null");
  });

  test("without any count there is no estimate, and it says what to do", () => {
    expect(() => estimateFromCounts(inputOf([1, 2], {}))).toThrow(
      "None of the 2 picks has a count. Enter counts first.",
    );
  });
});

describe("without replacement", () => {
  // (1 − 3/3) = 0: nothing is left to be estimated. Total 1 + 2 + 6 = 9.
  test("all units counted is exact, with a standard error of 0", () => {
    const result = valuesOf([1, 2, 6], { design: "srs-wor", units: 3 });
    expect(result.complete).toBe(true);
    expect(result.total.estimate).toBeCloseTo(9, 12);
    expect(result.total.standardError).toEqual({ kind: "known", value: 0 });
    expect(bounds(result.total.limits.logNormal)).toEqual({
      lower: result.total.estimate,
      upper: result.total.estimate,
    });
    expect(keys(result)).toContain("complete");
  });

  test("a cell that is picked twice is refused, because the pairing is wrong", () => {
    const input = inputOf([1, 2, 1], { 1: 3, 2: 4 }, { design: "srs-wor" });
    expect(() => estimateFromCounts(input)).toThrow("no cell is picked twice");
  });

  // With replacement v = N²s²/n; without, times 1 − n/N. Here n/N = 4/8, so the ratio of the errors is √0.5.
  test("the finite population correction applies without replacement only", () => {
    const values = [1, 5, 2, 9];
    const withIt = numberOf(valuesOf(values, { units: 8 }).total.standardError);
    const without = numberOf(valuesOf(values, { units: 8, design: "srs-wor" }).total.standardError);
    expect(without / withIt).toBeCloseTo(Math.SQRT1_2, 12);
  });

  test("more cells than the frame has are refused", () => {
    const sample = { design: "srs-wr", units: 2, values: [1, 2, 3], distinct: 3 } as const;
    expect(() => srsEstimate(sample)).toThrow("The picks are of 3 cells, and the frame has 2.");
    expect(srsEstimate({ ...sample, distinct: 2 }).mean).toBe(2);
  });

  test("a unit that the frame doesn't have is named", () => {
    expect(() => estimateFromCounts(inputOf([51], { 51: 2 }))).toThrow(
      "Pick 1 is of unit 51; the frame has units 1 to 50.",
    );
  });
});

describe("density", () => {
  // By hand: cells of 10 × 10 m, shares 1, 0.5 and 0.25: 1.75 · 100 m² = 175 m². Counts 3, 2, 1 all picked, N = 3:
  // T = 6, so 6/175 m² = 342.857 per ha. The mean over a whole cell's area would say 2/100 m² = 200 per ha.
  test("under clip it is the total over the listed shares, not the mean over a cell", () => {
    const areaM2 = areaSpokenForM2({
      countIn: "inside",
      units: 3,
      cellAreaMm2: 100_000_000n,
      shareSumBillionths: 1_750_000_000n,
    });
    expect(areaM2).toBe(175);
    const result = valuesOf([3, 2, 1], { units: 3, design: "srs-wor", areaM2 });
    if (result.density.kind === "none") throw new Error("there is an area");
    expect(result.density.estimate).toBeCloseTo(342.857142857, 9);
  });

  // Whole cells: 3 · 100 m², whatever their shares.
  test("for whole cells the area is N cells", () => {
    const frame = {
      countIn: "whole",
      units: 3,
      cellAreaMm2: 100_000_000n,
      shareSumBillionths: 1_750_000_000n,
    } as const;
    expect(areaSpokenForM2(frame)).toBe(300);
  });

  // 10⁷ cells of 30 × 30 m at share 1: 9·10⁹ m², where S·a in billionths passes 2⁵³.
  test("ten million cells are exact", () => {
    const frame = {
      countIn: "inside",
      units: 10_000_000,
      cellAreaMm2: 900_000_000n,
      shareSumBillionths: 10_000_000_000_000_000n,
    } as const;
    expect(areaSpokenForM2(frame)).toBe(9_000_000_000);
  });

  test("a list without areas has no density", () => {
    expect(valuesOf([1, 2]).density).toEqual({ kind: "none", why: "no-area" });
  });
});

describe("picks without a count", () => {
  // Counts 4, 0, 2 of N = 50; unit 4 refused (closed), unit 5 not visited. 50·6/5 = 60; the 95th percentile is 4 (rank
  // ⌈0.95·3⌉ = 3): 50·(6 + 8)/5 = 140. The estimate itself is 50·2 = 100.
  const result = estimateFromCounts(
    inputOf(
      [1, 2, 3, 5],
      { 1: 4, 2: 0, 3: 2, 4: { state: "refused", reason: "no answer" } },
      { closedPicks: [{ order: 9, unit: 4, label: "A4" }] },
    ),
  );

  test("they are named with their states, and the bounds are told", () => {
    expect(result.total.estimate).toBe(100);
    expect(result.missing).toEqual([
      { order: 4, unit: 5, label: "A5", state: "not-visited", closed: false },
      { order: 9, unit: 4, label: "A4", state: "refused", closed: true },
    ]);
    expect(result.missingBounds).toEqual({ kind: "bounds", picks: 2, atZero: 60, percentile: 4, atPercentile: 140 });
  });

  test("the note names them and says what the estimate takes them to be", () => {
    const text = estimateNotes(result).find((note) => note.key === "missing")?.text ?? "";
    expect(text).toContain("2 picks of 5 have no count: 4 (A5, not visited yet) and 9 (A4, refused).");
    expect(text).toContain("They are not zeros. The estimate takes them to be like the rest.");
    expect(text).toContain("Had both held none, it would be 60");
  });

  // Unit 2 stands before unit 3 in the draw order and has no count: what is counted is no prefix.
  test("counts behind a pick that was not visited are told", () => {
    expect(result.countedOutOfOrder).toBe(0);
    const gap = estimateFromCounts(inputOf([1, 2, 3, 4], { 1: 4, 3: 2, 4: 1 }));
    expect(gap.countedOutOfOrder).toBe(2);
    expect(keys(gap)).toContain("out-of-order");
  });

  // 3 values 6, 0, 0 → 50·2 = 100, and one cell of them is told as not in the population.
  test("not in the population enters as 0 and its number is told", () => {
    const outside = estimateFromCounts(inputOf([1, 2, 3], { 1: 6, 2: 0, 3: { state: "not-in-population" } }));
    expect(outside.picksCounted).toBe(3);
    expect(outside.total.estimate).toBe(100);
    expect(outside.states).toContainEqual({ state: "not-in-population", picks: 1, cells: 1 });
    expect(keys(outside)).toContain("not-in-population");
  });

  // Without unit 3: 50·(4 + 0)/2 = 100. With its 8 as before: 50·12/3 = 200.
  test("a count amended to a closed state is shown both ways", () => {
    const amended = estimateFromCounts(
      inputOf(
        [1, 2],
        { 1: 4, 2: 0, 3: { state: "lost" } },
        { closedPicks: [{ order: 3, unit: 3, label: "A3" }], countedBefore: new Map([[3, 8]]) },
      ),
    );
    expect(amended.total.estimate).toBe(100);
    expect(amended.withAmendedAsCounted).toMatchObject({ kind: "amended", picks: 1, total: 200, mean: 4 });
    expect(keys(amended)).toContain("amended");
    expect(result.withAmendedAsCounted).toEqual({ kind: "none-amended" });
  });
});

describe("a count far above the others", () => {
  // 50 is ten times 5 and more; without it the total is 50·(5 + 1 + 2)/3 = 133.33.
  test("it is named with the total without it, and kept", () => {
    const result = valuesOf([5, 1, 50, 2]);
    expect(result.farAbove).toMatchObject({ kind: "far-above", unit: 3, value: 50, nextLargest: 5 });
    if (result.farAbove.kind === "none-far-above") throw new Error("50 is far above");
    expect(result.farAbove.totalWithout).toBeCloseTo(133.3333, 4);
    expect(result.total.estimate).toBeCloseTo((50 * 58) / 4, 10);
  });

  test("49 beside 5 is not ten times as much", () => {
    expect(valuesOf([5, 1, 49, 2]).farAbove).toEqual({ kind: "none-far-above" });
  });
});
