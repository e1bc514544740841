import { describe, expect, test } from "vitest";
import { epsgLookup, searchEpsg } from "#server/jobs/epsg.ts";

describe("the EPSG list", () => {
  test("gives bounds as west, south, east, north", () => {
    expect(epsgLookup(2193)).toMatchObject({
      name: "NZGD2000 / New Zealand Transverse Mercator 2000",
      kind: "projected",
    });
    expect(epsgLookup(31370)?.bounds).toEqual([2.5, 49.5, 6.4, 51.51]);
  });

  test("knows only numbers that are EPSG's own", () => {
    expect(epsgLookup(102_003)).toBeUndefined();
    expect(epsgLookup(54_009)).toBeUndefined();
  });

  test("a number finds its system first", () => {
    expect(searchEpsg("25833", 5)[0]).toMatchObject({ epsg: 25833, name: "ETRS89 / UTM zone 33N" });
    expect(searchEpsg("EPSG:25833", 1)[0]?.epsg).toBe(25833);
  });

  test("words find systems by name, those met everywhere first", () => {
    expect(searchEpsg("utm zone 33n", 2, { projectedOnly: true }).map(({ epsg }) => epsg)).toEqual([25833, 32633]);
  });

  test("words find systems by place", () => {
    expect(searchEpsg("belgium lambert", 10, { projectedOnly: true }).map(({ epsg }) => epsg)).toContain(31370);
  });

  test("a system that cannot be used says why, and stands last", () => {
    const found = searchEpsg("north carolina", 10, { projectedOnly: true });
    expect(found.find(({ epsg }) => epsg === 2264)?.note).toContain("not in metres");
    expect(found[0]?.epsg).toBe(3358);
    expect(searchEpsg("31467", 1)[0]?.note).toContain("BETA2007.gsb");
  });

  test("an empty text finds nothing", () => {
    expect(searchEpsg("  ", 5)).toEqual([]);
  });
});
