import { afterEach, describe, expect, it, vi } from "vitest";
import {
  formatArea,
  formatAsIs,
  formatBytes,
  formatCount,
  formatHash,
  formatHectares,
  formatList,
  formatMillimetres,
  formatNumber,
  formatPercent,
  formatSeed,
  formatSignificant,
  formatUnit,
  timesIn,
} from "../../../src/components/ui/format.ts";

afterEach(() => {
  vi.unstubAllEnvs();
});

describe("numbers on screen", () => {
  it("parts thousands with U+202F from 1 000 up", () => {
    expect(formatNumber(999)).toBe("999");
    expect(formatNumber(1000)).toBe("1\u202f000");
    expect(formatNumber(104_932_400)).toBe("104\u202f932\u202f400");
    expect(formatNumber(1234.5, 2)).toBe("1\u202f234.50");
  });

  it("writes the minus as U+2212, and minus zero without one", () => {
    expect(formatNumber(-12.5, 1)).toBe("\u221212.5");
    expect(formatNumber(-0.04, 1)).toBe("0.0");
    expect(formatNumber(-0)).toBe("0");
  });

  it("refuses to write what is no number", () => {
    expect(() => formatNumber(NaN)).toThrow(RangeError);
    expect(() => formatNumber(Infinity)).toThrow(RangeError);
  });

  it("keeps the decimals that a value has, and no noise of binary fractions", () => {
    expect(formatAsIs(2.5)).toBe("2.5");
    expect(formatAsIs(0.1 + 0.2)).toBe("0.3");
    expect(formatAsIs(12)).toBe("12");
  });

  it("puts U+00A0 before a unit and before %", () => {
    expect(formatUnit("20", "m")).toBe("20\u00a0m");
    expect(formatPercent(0.2048)).toBe("20.5\u00a0%");
    expect(formatPercent(1, 0)).toBe("100\u00a0%");
  });

  it("writes areas in hectares with two decimals, in square metres below 0.01 ha", () => {
    expect(formatArea(262_300)).toBe("26.23\u00a0ha");
    expect(formatArea(100)).toBe("0.01\u00a0ha");
    expect(formatArea(99)).toBe("99\u00a0m²");
    expect(formatArea(2.6)).toBe("2.6\u00a0m²");
    expect(formatHectares(34_100)).toBe("3.41");
  });

  it("writes millimetres as metres with the decimals that they have", () => {
    expect(formatMillimetres(20_000)).toBe("20\u00a0m");
    expect(formatMillimetres(12_250)).toBe("12.25\u00a0m");
    expect(formatMillimetres(2)).toBe("0.002\u00a0m");
  });

  it("rounds to significant figures", () => {
    expect(formatSignificant(2925.7, 3)).toBe("2\u202f930");
    expect(formatSignificant(0.80812, 2)).toBe("0.81");
    expect(formatSignificant(99.96, 3)).toBe("100");
    expect(formatSignificant(0, 3)).toBe("0");
    expect(() => formatSignificant(1, 0)).toThrow(RangeError);
  });
});

describe("texts and times on screen", () => {
  it("shortens a hash to its first 8 and last 6 characters", () => {
    expect(formatHash("17f6c777" + "0".repeat(50) + "c3d9a4")).toBe("17f6c777…c3d9a4");
    expect(formatHash("abc")).toBe("abc");
  });

  it("keeps every character of a seed, between straight quotes", () => {
    expect(formatSeed("007 3")).toBe('"007 3"');
  });

  // Central European Summer Time is UTC+2 from 30 March to 26 October 2031, winter time UTC+1; Lima is UTC−5 all year.
  it("writes times on the clock of a zone, with its abbreviation, whatever the machine's zone", () => {
    vi.stubEnv("TZ", "America/Lima");
    const paris = timesIn("Europe/Paris");
    expect(paris.time("2031-06-03T09:12:44Z")).toBe("3 June 2031, 11:12 CEST");
    expect(paris.time("2031-12-31T23:05:00Z")).toBe("1 January 2032, 00:05 CET");
    expect(paris.day("2031-06-02T22:30:00Z")).toBe("3 June 2031");
    expect(paris.timeOfDay("2031-06-02T22:30:00Z")).toBe("00:30");
    expect(timesIn("America/Lima").time("2031-06-03T02:12:44Z")).toBe("2 June 2031, 21:12 UTC\u22125");
    expect(() => paris.time("yesterday")).toThrow(RangeError);
  });

  it("writes times in UTC where that is the zone, or where the browser does not know the zone", () => {
    expect(timesIn("UTC").time("2031-06-03T01:12:44+02:00")).toBe("2 June 2031, 23:12 UTC");
    expect(timesIn("Mars/Olympus").time("2031-06-03T09:12:44Z")).toBe("3 June 2031, 09:12 UTC");
    expect(timesIn("Mars/Olympus").zone).toBe("UTC");
  });

  it("writes sizes, counted nouns and lists", () => {
    expect(formatBytes(412)).toBe("412\u00a0bytes");
    expect(formatBytes(41_300)).toBe("41\u00a0KB");
    expect(formatBytes(2_300_000)).toBe("2.3\u00a0MB");
    expect(formatBytes(82_814_100_000)).toBe("82.8\u00a0GB");
    expect(formatCount(1, "cell")).toBe("1 cell");
    expect(formatCount(741, "cell")).toBe("741 cells");
    expect(formatCount(0, "entry", "entries")).toBe("0 entries");
    expect(formatList(["A", "B", "C"])).toBe("A, B and C");
    expect(formatList(["A"])).toBe("A");
  });
});
