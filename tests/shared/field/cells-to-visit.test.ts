import { describe, expect, test } from "vitest";
import type { Entry } from "#shared/draw/draw.ts";
import { cellsToVisit, expectedDistinctCells } from "#shared/field/cells-to-visit.ts";
import { entriesInUse } from "#shared/field/in-use.ts";
import { completePrefix } from "#shared/field/prefix.ts";
import { CLOSING_STATES, VISIT_STATES, isClosing, type VisitState } from "#shared/field/states.ts";

const entry = (position: number, unit: number, reserve = false): Entry => ({ position, unit, repeatOf: null, reserve });

describe("states of a visit", () => {
  test("only refused, unsafe, not reached and lost close a cell", () => {
    expect(VISIT_STATES.map((state) => [state, isClosing(state)])).toEqual([
      ["counted", false],
      ["not-in-population", false],
      ["refused", true],
      ["unsafe", true],
      ["not-reached", true],
      ["lost", true],
    ]);
    expect(VISIT_STATES.filter(isClosing)).toEqual([...CLOSING_STATES]);
  });
});

describe("cells to visit", () => {
  // Five picks of units 9 4 9 7 9: three cells; 9 first at place 1 and three times.
  test("a cell picked three times is one row with its first place and all its places", () => {
    const inUse = [entry(1, 9), entry(2, 4), entry(3, 9), entry(4, 7), entry(5, 9, true)];
    expect(cellsToVisit([{ stratum: "", inUse }])).toEqual([
      { stratum: "", unit: 9, order: 1, orders: [1, 3, 5], times: 3, reserve: false },
      { stratum: "", unit: 4, order: 2, orders: [2], times: 1, reserve: false },
      { stratum: "", unit: 7, order: 4, orders: [4], times: 1, reserve: false },
    ]);
  });

  test("rows stand in draw order, whatever order the entries came in", () => {
    const rows = cellsToVisit([{ stratum: "", inUse: [entry(6, 1, true), entry(2, 5), entry(4, 3)] }]);
    expect(rows.map((row) => row.order)).toEqual([2, 4, 6]);
    expect(rows.map((row) => row.reserve)).toEqual([false, false, true]);
  });

  test("each stratum has its own order from 1", () => {
    const rows = cellsToVisit([
      { stratum: "rim", inUse: [entry(1, 3)] },
      { stratum: "turf", inUse: [entry(1, 8)] },
    ]);
    expect(rows.map(({ stratum, unit, order }) => [stratum, unit, order])).toEqual([
      ["rim", 3, 1],
      ["turf", 8, 1],
    ]);
  });

  // By hand: one cell is always that cell; two picks of two cells hold 2(1 − 1/4) = 1.5; one pick holds one.
  test("the expected number of different cells", () => {
    expect(expectedDistinctCells(1, 5)).toBe(1);
    expect(expectedDistinctCells(1, 0)).toBe(0);
    expect(expectedDistinctCells(2, 2)).toBeCloseTo(1.5, 12);
    expect(expectedDistinctCells(10_000_000, 1)).toBeCloseTo(1, 12);
    expect(() => expectedDistinctCells(0, 1)).toThrow(RangeError);
    expect(() => expectedDistinctCells(5, -1)).toThrow(RangeError);
  });
});

describe("the prefix that is complete if the season stops today", () => {
  // Picks 7 3 9 4, reserves 3 5. Unit 3 is closed: position 5 falls on it and is passed over, 6 (unit 5) opens.
  const list = [7, 3, 9, 4, 3, 5].map((unit, i) => entry(i + 1, unit, i >= 4));
  const inUse = entriesInUse(list, 4, [{ kind: "close", unit: 3 }]);
  const after = (states: Record<number, VisitState>) =>
    completePrefix(inUse, new Map(Object.entries(states).map(([unit, state]) => [Number(unit), state])));

  test("nothing visited: nothing is complete", () => {
    expect(after({})).toEqual({
      complete: 0,
      picksWithValue: 0,
      nextPosition: 1,
      nextUnit: 7,
      toVisit: 4,
      picksBeyond: 0,
    });
  });

  // 7 counted, 3 closed, 9 waiting at position 3: positions 1 and 2 are settled, one has a value; 4 and 5 lie beyond.
  test("a cell not yet visited ends the prefix, closed ones do not", () => {
    expect(after({ 7: "counted", 3: "refused", 4: "counted", 5: "counted" })).toEqual({
      complete: 2,
      picksWithValue: 1,
      nextPosition: 3,
      nextUnit: 9,
      toVisit: 1,
      picksBeyond: 2,
    });
  });

  test("a cell outside the population is settled: it enters as zero", () => {
    expect(after({ 7: "not-in-population", 3: "refused", 9: "counted" })).toMatchObject({
      complete: 3,
      picksWithValue: 2,
    });
  });

  test("all visited: the opened prefix is complete", () => {
    expect(after({ 7: "counted", 3: "refused", 9: "counted", 4: "counted", 5: "counted" })).toEqual({
      complete: 6,
      picksWithValue: 4,
      nextPosition: null,
      nextUnit: null,
      toVisit: 0,
      picksBeyond: 0,
    });
  });
});
