import { describe, expect, test } from "vitest";
import { readLevel } from "#shared/estimate/level.ts";
import { distributionOf, quantileOf } from "#shared/estimate/distribution.ts";
import { formulaLines } from "#shared/estimate/formula.ts";
import { methodsStatement, type MethodsFacts } from "#shared/estimate/methods-statement.ts";
import {
  estimateText,
  figuresFor,
  printedLimits,
  printedLimitsOf,
  roundAt,
  roundingPlace,
} from "#shared/estimate/rounding.ts";
import { estimateSentence, sentenceText } from "#shared/estimate/sentence.ts";
import { valuesOf } from "./builders.ts";

const plain = (text: string) => text.replaceAll(/[\u202f\u00a0]/g, " ");
const spikes = { objects: "flowering spikes", verb: "stand" };
const known = (value: number) => ({ kind: "known", value }) as const;

describe("rounding", () => {
  // Two figures of 599 end at the tens: 2 926 → 2 930, in 3 figures. Two figures of 0.808 end at the hundredths.
  test.each([
    [2926, 599, "2 930", 3],
    [4387.3, 599, "4 390", 3],
    [1950.4, 599, "1 950", 3],
    [3.948, 0.808, "3.95", 3],
    [111.5, 22.8, "112", 3],
    [160, 62.048, "160", 3],
    [4, 599, "0", 1],
    [0.01234, 0.0056, "0.0123", 3],
    [12_345_678, 1_000_000, "12 300 000", 3],
    [-226.2, 62, "−226", 3],
  ])("%s with a standard error of %s reads %s", (value, error, text, figures) => {
    expect(plain(estimateText(value, known(error)))).toBe(text);
    expect(figuresFor(value, error)).toBe(figures);
  });

  // 10³ must not fall to 2.9999… as its logarithm can.
  test("powers of ten have their own place", () => {
    expect([1000, 999.9, 1, 0.1].map(roundingPlace)).toEqual([2, 1, -1, -2]);
    expect(roundAt(0.30000000000000004, -1)).toBe(0.3);
    expect(() => roundingPlace(0)).toThrow("above zero");
  });

  test("without a standard error at most two decimals are kept", () => {
    expect(estimateText(200, { kind: "none", why: "one-pick" })).toBe("200");
    expect(estimateText(3.875, known(0))).toBe("3.88");
  });

  // The lower limit 190 is under the 215 that were seen; 220 isn't, but at tens 218 rounds to 220 and 211 to 210.
  test("a lower limit under the number seen is printed as that number", () => {
    const limits = (lower: number) => ({ kind: "interval", lower, upper: 4390 }) as const;
    expect(printedLimits(limits(190), known(599), 215)).toMatchObject({ lower: "215", raised: true });
    expect(printedLimits(limits(218), known(599), 215)).toMatchObject({ lower: "220", raised: false });
    expect(printedLimits(limits(224), known(599), 223)).toMatchObject({ lower: "223", raised: false });
  });
});

describe("the sentence", () => {
  // N = 50, counts 4, 0, 7, 4, 1 on five cells: 160 ± 62.05; C = exp(2.77645·√ln(1 + 0.387802²)) = exp(2.77645·0.3743) = 2.827: 56.6 to 452.3.
  test("it says estimate and declared limits, rounded by the standard error", () => {
    const result = valuesOf([4, 0, 7, 4, 1]);
    expect(plain(sentenceText(estimateSentence(result, spikes)))).toBe(
      "About 160 flowering spikes stand in the study area, with 95 % confidence limits of 57 and 452.",
    );
    expect(estimateSentence(result, spikes).filter((part) => part.role === "limit")).toHaveLength(2);
  });

  test("whole cells speak for the cells, not for the study area", () => {
    const result = valuesOf([4, 0, 7, 4, 1], { countIn: "whole", limits: "t" });
    // The t lower limit −12.3 is printed as the 16 seen.
    expect(plain(sentenceText(estimateSentence(result, { objects: "burrows" })))).toBe(
      "About 160 burrows are in the cells of the frame, with 95 % confidence limits of 16 and 332.",
    );
    expect(printedLimitsOf(result, "mean", "t")).toMatchObject({ lower: "0.32", raised: true });
  });

  // 50·3.689/12 = 15.37 and 50·2.996/12 = 12.48, printed upwards.
  test("only zeros say the model and both upper limits", () => {
    const text = plain(sentenceText(estimateSentence(valuesOf(Array(12).fill(0)), spikes)));
    expect(text).toBe(
      "No flowering spikes were found in 12 cells. If they lie independently of each other, at most 16 stand in the study area, with 95 % confidence (two-sided; one-sided 13).",
    );
  });

  test("one pick, no variation and a complete count say so", () => {
    const text = (values: number[], rest = {}) => plain(sentenceText(estimateSentence(valuesOf(values, rest), spikes)));
    expect(text([4])).toContain("About 200 flowering spikes stand in the study area, from a single cell");
    expect(text([3, 3])).toContain("the sample shows no variation");
    expect(text([1, 2, 6], { design: "srs-wor", units: 3 })).toBe(
      "9 flowering spikes stand in the study area: every cell of the frame was counted, so nothing is estimated.",
    );
  });
});

describe("the formula with its values", () => {
  const lines = formulaLines(valuesOf([4, 0, 7, 4, 1], { areaM2: 20_000 }));
  const line = (key: string) => {
    const found = lines.find((candidate) => candidate.key === key);
    return found === undefined
      ? ""
      : plain(`${found.symbol} = ${found.formula} = ${found.substituted} = ${found.result}`);
  };

  // By hand as above; √(7.7/5) = 1.240967, 50 · 1.240967 = 62.0484, 160 / 2 ha = 80.
  test("each step stands with its numbers", () => {
    expect(line("mean")).toBe("ȳ = Σy / n = 16 / 5 = 3.2");
    expect(line("total")).toBe("T = N · ȳ = 50 × 3.2 = 160");
    expect(line("standardErrorOfMean")).toBe("SE(ȳ) = √(s² / n) = √(7.7 / 5) = 1.24097");
    expect(line("standardErrorOfTotal")).toBe("SE(T) = N · SE(ȳ) = 50 × 1.24097 = 62.0484");
    expect(line("coefficientOfVariation")).toBe("cv = SE(T) / T = 62.0484 / 160 = 0.387802");
    expect(line("tQuantile")).toBe("t = t(level, n − 1) = t(95 %, 4) = 2.77645");
    expect(line("density")).toBe("D = T / A, per hectare = 160 / 2 ha = 80");
  });

  test("without replacement the correction stands in the formula", () => {
    const wor = formulaLines(valuesOf([4, 0, 7], { design: "srs-wor", units: 20 }));
    expect(wor.find(({ key }) => key === "standardErrorOfMean")?.formula).toBe("√((1 − n/N) · s² / n)");
  });

  test("zeros show how the upper limits come about", () => {
    const zero = formulaLines(valuesOf([0, 0, 0]));
    expect(zero.find(({ key }) => key === "allZeroOneSided")?.substituted).toBe("50 × (−ln 0.05) / 3");
    expect(zero.some(({ key }) => key === "logNormalLimits")).toBe(false);
  });
});

describe("the distribution", () => {
  // By hand: zeros 2 of 5; ranks of the quartiles ⌈1.25⌉ = 2 and ⌈3.75⌉ = 4 of 0, 0, 1, 4, 7.
  test("small whole counts get a bin each, zeros told", () => {
    const got = distributionOf([4, 0, 7, 0, 1]);
    expect(got.kind).toBe("whole");
    expect(got.bins.map((bin) => bin.picks)).toEqual([2, 1, 0, 0, 1, 0, 0, 1]);
    expect(got.shareOfZeros).toBe(0.4);
    expect(got.quantiles).toEqual({
      minimum: 0,
      lowerQuartile: 0,
      median: 1,
      upperQuartile: 4,
      percentile95: 7,
      maximum: 7,
    });
  });

  // Up to 215 in at most 16 classes: width 20 (215/16 = 13.4). 20 falls in 1–20, 21 in 21–40.
  test("wide whole counts get classes of a round width, zeros apart", () => {
    const { bins } = distributionOf([0, 20, 21, 215]);
    expect(bins.slice(0, 3)).toEqual([
      { from: 0, to: 0, picks: 1 },
      { from: 1, to: 20, picks: 1 },
      { from: 21, to: 40, picks: 1 },
    ]);
    expect(bins.at(-1)).toEqual({ from: 201, to: 220, picks: 1 });
  });

  test("measured values get classes too, every value in one of them", () => {
    const values = [0, 0.05, 0.31, 1.2, 0.3];
    const got = distributionOf(values);
    expect(got.kind).toBe("measured");
    expect(got.bins.reduce((sum, bin) => sum + bin.picks, 0)).toBe(values.length);
    expect(got.bins[1]).toMatchObject({ from: 0, to: 0.1, picks: 1 });
    expect(got.bins[3]).toMatchObject({ from: 0.2, to: 0.3, picks: 1 });
  });

  // ⌈0.95 · 60⌉ = 57, ⌈0.95 · 58⌉ = ⌈55.1⌉ = 56.
  test("a quantile is one of the values, at the exact rank", () => {
    const sorted = Array.from({ length: 60 }, (_, i) => i + 1);
    expect(quantileOf(sorted, 0.95)).toBe(57);
    expect(quantileOf(sorted.slice(0, 58), 0.95)).toBe(56);
    expect(quantileOf(sorted, 0)).toBe(1);
    expect(quantileOf(sorted, 1)).toBe(60);
  });

  test("a single zero is a distribution", () => {
    expect(distributionOf([0]).bins).toEqual([{ from: 0, to: 0, picks: 1 }]);
  });
});

describe("confidence levels", () => {
  test.each([
    ["0.95", 0.95],
    ["95", 0.95],
    ["95 %", 0.95],
    ["0,9", 0.9],
    ["99.9%", 0.999],
  ])("%s is read as %s", (text, level) => {
    expect(readLevel(text)).toBe(level);
  });

  test.each(["100", "1", "0", "0.2", "abc", "", "-95", "1.0"])("%s is refused", (text) => {
    expect(() => readLevel(text)).toThrow(/Give/);
  });
});

describe("the methods statement", () => {
  const facts: MethodsFacts = {
    survey: "Holm *north*",
    season: "2031",
    target: spikes,
    countingRule: "One spike is one object.",
    frame: {
      version: 2,
      crsName: "WGS 84 / UTM zone 30N",
      epsg: 32630,
      cellWidthM: 20,
      cellHeightM: 20,
      membership: "touch",
      areaM2: 20_000,
      uncoveredM2: 0,
      cellsLeftOut: 0,
      sha256: "ab".repeat(32),
      sealedAt: "2031-06-01T08:00:00Z",
    },
    draw: {
      number: 1,
      picks: 5,
      reserves: 5,
      added: 2,
      generator: "sha256-counter",
      seed: "007`x",
      seedSource: { kind: "typed", by: "Ines" },
      declaredAt: "2031-06-02T08:00:00Z",
      drawnAt: "2031-06-02T08:01:00Z",
      withdrawn: 1,
      abandoned: 0,
    },
    limitsDeclared: false,
    counted: { from: "2031-07-01", to: "2031-07-03", observers: 2 },
    software: { name: "Quillet", version: "0.1.0" },
  };
  const text = plain(methodsStatement(facts, valuesOf([4, 0, 7, 4, 1], { areaM2: 20_000 })));

  test("it says frame, draw, seed, counts, formula and what was decided late", () => {
    expect(text).toContain("About 160 flowering spikes stand in the study area");
    expect(text).toContain("version 2, sealed on 1 June 2031, is a grid of 20 × 20 m cells");
    expect(text).toContain("The estimate speaks for 2.00 ha.");
    expect(text).toContain("was chosen by Ines; nothing shows that only one was tried.");
    expect(text).toContain("lengthened by 2 entries of the same stream");
    expect(text).toContain("1 other draw withdrawn");
    expect(text).toContain("variance N² · s² / n");
    expect(text).toContain("chosen after counts were seen");
    expect(text).toContain("5 counted");
    expect(text).toContain("from 4 degrees of freedom");
  });

  test("names of people can't become Markdown, and a seed keeps its back quote", () => {
    expect(text).toContain("# Methods: Holm \\*north\\*, 2031");
    expect(text).toContain("`` 007`x ``");
  });
});
