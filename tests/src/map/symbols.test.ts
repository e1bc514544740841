import { describe, expect, it } from "vitest";
import { badgePlace, isNear, pathOfCells } from "../../../src/map/cell-path.ts";
import { countClass } from "../../../src/map/count-classes.ts";
import { fittingScale } from "../../../src/map/planar-map.ts";
import { boundsOfPolygons, cellAt, cellBox, pathOfRings } from "../../../src/map/sheet-geometry.ts";

const GRID = { widthMm: 20_000, heightMm: 20_000, originEastMm: 0, originNorthMm: 0 };
const AT = { scale: 0.5, anchorEast: 100, anchorNorth: 200 };

describe("cells on the sheet", () => {
  // Cell (5, 8) covers 100–120 m east, 160–180 m north: 20 m below the anchor's north, 10 px wide.
  it("stand where their metres say, north up", () => {
    expect(cellBox(GRID, 5, 8, AT)).toEqual({ x: 0, y: 10, width: 10, height: 10 });
    expect(pathOfCells([{ column: 5, row: 8 }], GRID, AT)).toBe("M0.00 10.00h10.00v10.00h-10.00z");
  });

  it("a place belongs to the cell whose lower or left edge it lies on, below zero too", () => {
    expect(cellAt(GRID, 100, 160)).toEqual({ column: 5, row: 8 });
    expect(cellAt(GRID, 119.999, 179.999)).toEqual({ column: 5, row: 8 });
    expect(cellAt(GRID, -0.001, -20)).toEqual({ column: -1, row: -1 });
  });

  it("are near when any part of them is in sight", () => {
    const near = { west: 100, east: 200, south: 100, north: 200 };
    expect(isNear({ column: 4, row: 5 }, GRID, near)).toBe(false);
    expect(isNear({ column: 5, row: 5 }, GRID, near)).toBe(true);
    expect(isNear({ column: 5, row: 5 }, GRID, { ...near, west: 119 })).toBe(true);
  });
});

describe("the badge of a repeat", () => {
  const cell = { column: 0, row: 0 };
  const taken =
    (...places: string[]) =>
    (column: number, row: number) =>
      places.includes(`${column},${row}`);

  // A badge is 22 × 17 px, a cell here 17.7: at the right it covers the two cells beyond, above the cell over it.
  it("goes to the right, then left, above, below, where it covers no other drawn cell", () => {
    expect(badgePlace(cell, 17.7, 17.7, taken()).x).toBeGreaterThan(0);
    expect(badgePlace(cell, 17.7, 17.7, taken("1,0")).x).toBeLessThan(0);
    expect(badgePlace(cell, 17.7, 17.7, taken("1,0", "-1,0")).y).toBeLessThan(0);
    expect(badgePlace(cell, 17.7, 17.7, taken("1,0", "-1,0", "0,1")).y).toBeGreaterThan(0);
    expect(badgePlace(cell, 17.7, 17.7, taken("1,0", "-1,0", "0,1", "0,-1")).x).toBeGreaterThan(0);
  });

  it("looks as many cells away as it is wide", () => {
    expect(badgePlace(cell, 17.7, 17.7, taken("2,0")).x).toBeLessThan(0);
    expect(badgePlace(cell, 60, 60, taken("2,0")).x).toBeGreaterThan(0);
  });
});

describe("the ramp of counts", () => {
  it("has the steps 0, 1, 2–4, 5–9, 10–19, 20 and more; a decimal above nothing is no zero", () => {
    expect([0, 0.2, 1, 1.4, 1.5, 2, 4, 5, 9, 10, 19, 20, 1e6].map(countClass)).toEqual([
      0, 1, 1, 1, 2, 2, 2, 3, 3, 4, 4, 5, 5,
    ]);
  });

  it("takes nothing that is no count", () => {
    expect(() => countClass(NaN)).toThrow(RangeError);
    expect(() => countClass(-1)).toThrow(RangeError);
  });
});

describe("outlines", () => {
  const SQUARE = [
    [
      [
        [0, 0],
        [100_000, 0],
        [100_000, 50_000],
        [0, 50_000],
      ],
    ],
  ] as const;

  it("have bounds in metres; an outline without a vertex has none", () => {
    expect(boundsOfPolygons(SQUARE)).toEqual({ west: 0, south: 0, east: 100, north: 50 });
    expect(() => boundsOfPolygons([])).toThrow(RangeError);
  });

  it("become one path, without the vertices that nobody could see", () => {
    const ring = [
      [100_000, 200_000],
      [100_100, 200_000],
      [120_000, 200_000],
      [120_000, 180_000],
    ] as const;
    expect(pathOfRings([ring], AT)).toBe("M0.00 0.00L10.00 0.00L10.00 10.00Z");
  });

  // 100 m in 780 px, 50 m in 580 px: the width decides.
  it("fit whole into the sheet with a margin", () => {
    expect(fittingScale({ west: 0, south: 0, east: 100, north: 50 }, 800, 600, 10)).toBeCloseTo(7.8, 12);
    expect(fittingScale({ west: 0, south: 0, east: 100, north: 500 }, 800, 600, 10)).toBeCloseTo(1.16, 12);
  });
});
