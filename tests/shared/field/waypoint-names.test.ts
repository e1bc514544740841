import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { NAME_LENGTHS, NAME_SCHEMES, waypointNames } from "#shared/field/waypoint-names.ts";

const cell = (label: string, unit = 1, order = 1) => ({ label, unit, order });

describe("waypoint names", () => {
  test("a label is the name, prefix first, upper-case letters and digits only", () => {
    const named = waypointNames([cell("A1"), cell("AB27")], { length: 10, prefix: "dü-1" });
    expect(named).toEqual({
      names: ["DU1A1", "DU1AB27"],
      clashes: [],
      nextStep: null,
      notes: ['The prefix is written "DU1": names hold upper-case letters and digits only.'],
    });
  });

  // SKER + AB270 is nine characters: cut to six both are SKERAB.
  test("names that are equal after cutting are told with the cells and what to do", () => {
    const cells = [cell("AB270", 270, 1), cell("AB271", 271, 2), cell("C3", 40, 3)];
    const named = waypointNames(cells, { length: 6, prefix: "SKER" });
    expect(named.names).toEqual(["SKERAB", "SKERAB", "SKERC3"]);
    expect(named.clashes).toEqual([{ name: "SKERAB", labels: ["AB270", "AB271"] }]);
    expect(named.nextStep).toBe("Use a prefix of at most 1 character.");
    expect(waypointNames(cells, { length: 6, prefix: "S" }).clashes).toEqual([]);
  });

  test("with no room for a prefix it is to be left out", () => {
    const cells = [cell("ABC270"), cell("ABC271")];
    expect(waypointNames(cells, { length: 6, prefix: "S" }).nextStep).toBe("Leave the prefix out.");
  });

  // ABC2701 and ABD2701 differ at the third character: with three more in front at the sixth, which a length of six
  // keeps; with four in front at the seventh, which it cuts.
  test("the longest prefix that keeps the names apart is told, though the labels are cut", () => {
    const cells = [cell("ABC2701"), cell("ABD2701")];
    expect(waypointNames(cells, { length: 6, prefix: "SKER" }).nextStep).toBe("Use a prefix of at most 3 characters.");
    expect(waypointNames(cells, { length: 6, prefix: "SKE" }).names).toEqual(["SKEABC", "SKEABD"]);
  });

  // No prefix helps where the labels differ in their seventh character only.
  test("where no prefix is short enough, longer names or another scheme are proposed", () => {
    const cells = [cell("ABC2701", 1, 1), cell("ABC2702", 2, 2)];
    expect(waypointNames(cells, { length: 6, prefix: "SKER" }).nextStep).toBe(
      "Allow 14 characters if the unit does, or name the waypoints by unit number.",
    );
  });

  // AAAA10001 and AAAA10002 differ in the ninth character only.
  test("labels too long for the unit: longer names, or names by unit number", () => {
    const cells = [cell("AAAA10001", 123_456, 1), cell("AAAA10002", 123_457, 2)];
    const named = waypointNames(cells, { length: 8 });
    expect(named.clashes).toHaveLength(1);
    expect(named.nextStep).toBe("Allow 10 characters if the unit does, or name the waypoints by unit number.");
    expect(waypointNames(cells, { length: 8, scheme: "unit" }).names).toEqual(["123456", "123457"]);
  });
});

describe("names of other kinds and lengths", () => {
  test("names by place in the draw order have leading zeros, so that a unit sorts them", () => {
    const cells = [cell("A1", 9, 3), cell("B2", 1200, 12)];
    expect(waypointNames(cells, { length: 6, scheme: "order", prefix: "d" }).names).toEqual(["D03", "D12"]);
    expect(waypointNames(cells, { length: 6, scheme: "unit" }).names).toEqual(["0009", "1200"]);
  });

  test("labels that differ in case only clash, because units write upper case", () => {
    expect(waypointNames([cell("a1"), cell("A1")], { length: 30 }).clashes).toEqual([
      { name: "A1", labels: ["a1", "A1"] },
    ]);
  });

  // A unit that takes 7 characters: AB27000 fits, AB270001 and AB270002 are cut to one.
  test("any length may be set, and a length of none is a bug", () => {
    const cells = [cell("AB270001", 1, 1), cell("AB270002", 2, 2)];
    expect(waypointNames(cells, { length: 7 }).names).toEqual(["AB27000", "AB27000"]);
    expect(waypointNames(cells, { length: 7 }).nextStep).toMatch("Allow 8 characters");
    expect(() => waypointNames(cells, { length: 0 })).toThrow("got 0");
  });

  test("a label without letters or digits is no name", () => {
    const named = waypointNames([cell("鸟", 1, 1), cell("B1", 2, 2)], { length: 8 });
    expect(named.clashes).toEqual([{ name: "", labels: ["鸟"] }]);
    expect(named.nextStep).toBe("Name the waypoints by unit number.");
  });

  test("every name fits, is plain, and equal names are always told", () => {
    const cells = fc.uniqueArray(
      fc.record({
        label: fc.stringMatching(/^[A-Z]{1,5}[0-9]{1,7}$/),
        unit: fc.integer({ min: 1, max: 1e7 }),
        order: fc.integer({ min: 1, max: 1e5 }),
      }),
      { selector: (one) => one.unit, minLength: 1, maxLength: 30 },
    );
    fc.assert(
      fc.property(
        cells,
        fc.constantFrom(...NAME_LENGTHS),
        fc.constantFrom(...NAME_SCHEMES),
        fc.string({ maxLength: 8 }),
        (some, length, scheme, prefix) => {
          const { names, clashes, nextStep } = waypointNames(some, { length, scheme, prefix });
          expect(names).toHaveLength(some.length);
          for (const name of names) expect(name).toMatch(new RegExp(`^[A-Z0-9]{1,${length}}$`));
          const told = clashes.reduce((sum, clash) => sum + clash.labels.length - 1, 0);
          expect(new Set(names).size).toBe(names.length - told);
          expect(nextStep === null).toBe(clashes.length === 0);
        },
      ),
    );
  });
});
