import { describe, expect, it } from "vitest";
import { graticuleTicks, gridLines, gridStep, scaleBar } from "../../../src/map/sheet-lines.ts";

describe("grid lines of the margin", () => {
  // 656 px at 0.925 px a metre: 656 / 9 px are 78.8 m, so 100 m. On a sheet of 1 208 px the least step is 145 m, so 200 m.
  it("steps are 1, 2 or 5 times a power of ten, at least 64 px apart and at most nine along the sheet", () => {
    expect(gridStep(0.925, 656)).toBe(100);
    expect(gridStep(0.925, 1208)).toBe(200);
    expect(gridStep(0.64, 352)).toBe(100);
    expect(gridStep(0.639, 352)).toBe(200);
    expect(gridStep(64, 352)).toBe(1);
    for (const scale of [0.001, 0.037, 0.2, 1, 7.3, 100]) {
      for (const longer of [300, 656, 1500]) {
        const px = gridStep(scale, longer) * scale;
        expect(px).toBeGreaterThanOrEqual(64 * 0.999);
        expect(longer / px).toBeLessThan(9.001);
        expect(px).toBeLessThan(2.5 * 1.001 * Math.max(64, longer / 9));
      }
    }
    expect(() => gridStep(0, 656)).toThrow(RangeError);
  });

  it("prints the last three figures bold and the whole value once, at the first line with room for it", () => {
    const lines = gridLines(431_190, 431_905, 100, "m E", 65);
    expect(lines.map((line) => line.value)).toEqual([
      431_200, 431_300, 431_400, 431_500, 431_600, 431_700, 431_800, 431_900,
    ]);
    expect(lines.map((line) => line.lead + line.bold + line.tail)).toEqual([
      "",
      "431\u202f300\u202fm E",
      "400",
      "500",
      "600",
      "700",
      "800",
      "900",
    ]);
    expect(lines[1]).toEqual({ value: 431_300, lead: "431\u202f", bold: "300", tail: "\u202fm E" });
  });

  it("keeps three figures where they are zeros", () => {
    expect(gridLines(999, 1201, 100, "m E", 0).map((line) => line.bold)).toEqual(["000", "100", "200"]);
  });

  it("prints thousands bold where lines are a kilometre or more apart", () => {
    const lines = gridLines(5_712_000, 5_714_000, 1000, "m N", 0);
    expect(lines.map((line) => line.lead + line.bold + line.tail)).toEqual([
      "5712\u202f000\u202fm N",
      "713\u202f000",
      "714\u202f000",
    ]);
    expect(lines.map((line) => line.bold)).toEqual(["712", "713", "714"]);
  });

  it("writes the true minus west and south of the origin", () => {
    expect(gridLines(-250, -50, 100, "m E", 0).map((line) => line.lead + line.bold)).toEqual([
      "\u2212200",
      "\u2212100",
    ]);
  });
});

describe("the graticule of the margin", () => {
  // 2°00′28″ to 2°01′02″ along 340 m, steadily: 34″, so ticks every 5″.
  const edge = (metres: number) => (2 * 3600 + 28 + metres / 10) / 3600;

  it("names degrees once, then seconds alone while the minute stays", () => {
    const ticks = graticuleTicks(edge, 0, 340, ["E", "W"]);
    expect(ticks.map((tick) => tick.text)).toEqual(["2°00′30″\u00a0E", "35″", "40″", "45″", "50″", "55″", "2°01′00″"]);
    ticks.forEach((tick, index) => expect(tick.at).toBeCloseTo(20 + 50 * index, 6));
  });

  it("finds the place of a tick on an edge that is bent", () => {
    const bent = (metres: number) => (metres / 1000 + (metres / 1000) ** 2 / 50) / 60;
    for (const tick of graticuleTicks(bent, 0, 8000, ["N", "S"]))
      expect(bent(tick.at) * 3600).toBeCloseTo(tick.seconds, 3);
  });

  it("has its letter by the sign, and minutes without seconds where they are enough", () => {
    const west = (metres: number) => -3 + metres / 100_000;
    expect(graticuleTicks(west, 0, 30_000, ["E", "W"]).map((tick) => tick.text)).toEqual([
      "3°00′\u00a0W",
      "2°55′",
      "50′",
      "45′",
    ]);
  });

  it("draws none where the edge has no length", () => {
    expect(graticuleTicks(() => 2, 0, 100, ["E", "W"])).toEqual([]);
  });
});

describe("the scale bar", () => {
  it("is the longest of 1, 2 or 5 times a power of ten that has room", () => {
    expect(scaleBar(0.925, 200)).toMatchObject({ metres: 200, label: "200\u00a0m", half: "100" });
    expect(scaleBar(0.925, 90)).toMatchObject({ metres: 50, label: "50\u00a0m" });
    expect(scaleBar(0.01, 200)).toMatchObject({ metres: 20_000, label: "20\u00a0km", half: "10" });
    expect(scaleBar(400, 200)).toMatchObject({ metres: 0.5, label: "0.5\u00a0m" });
    expect(scaleBar(0.925, 200).px).toBeCloseTo(185, 9);
  });
});
