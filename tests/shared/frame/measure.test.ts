import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import { measureCells } from "#shared/frame/measure.ts";
import { selectCells } from "#shared/frame/select.ts";
import { nodeRings } from "#shared/geometry/noding.ts";
import { areaOf, type PlaneArea } from "#shared/geometry/rings.ts";
import { areas, rectangles } from "./boundaries.ts";
import { checkedCells } from "./exact-check.ts";
import { listed } from "./listed.ts";

vi.setConfig({ testTimeout: 60_000 });

const measuredCells = (area: PlaneArea, spec: Parameters<typeof measureCells>[1]) => {
  const measured = measureCells(area, spec);
  return listed(measured)
    .map(({ column, row, share, piece }) => ({ column, row, share, centre: measured.centreIn[piece] === 1 }))
    .filter(({ share, centre }) => share > 0 || centre);
};

const one = (...ring: number[]): PlaneArea => ({ polygons: [[ring]] });

describe("shares and centres", () => {
  // Brute force in exact fractions, cell by cell (exact-check.ts).
  test("equal those of an exact clipping of every cell, for any boundary, cell size and origin", () => {
    fc.assert(
      fc.property(areas(), ({ spec, area }) => {
        expect(measuredCells(area, spec)).toEqual(checkedCells(area, spec));
      }),
      { numRuns: 200 },
    );
  });

  test("equal those of an exact clipping for edges of thousands of kilometres, whose products pass 2⁵³", () => {
    const far = fc.integer({ min: -4_000_000_000, max: 4_000_000_000 });
    const triangle = fc.tuple(far, far, far, far, far, far).map((ring) => nodeRings([ring]));
    fc.assert(
      fc.property(triangle, fc.constantFrom(400_000_000, 999_999_998), (area, side) => {
        fc.pre(area.polygons.length > 0);
        const spec = rectangles(side, side - 2, 12_345, -6_789);
        expect(measuredCells(area, spec)).toEqual(checkedCells(area, spec));
      }),
      { numRuns: 150 },
    );
  });

  test("sum to the area: what rounding to billionths leaves is at most half a billionth of a cell for each edge cell", () => {
    fc.assert(
      fc.property(areas(12, 14), ({ spec, area }) => {
        const measured = measureCells(area, spec);
        const sum = listed(measured).reduce((total, { share }) => total + BigInt(share), 0n);
        const cell = BigInt(spec.widthMm) * BigInt(spec.heightMm);
        const difference = 2n * sum * cell - areaOf(area).twiceMm2 * 1_000_000_000n;
        const cellsTouched = BigInt(measured.columns * measured.rows);
        expect(difference <= cellsTouched * cell && difference >= -cellsTouched * cell).toBe(true);
      }),
      { numRuns: 300 },
    );
  });

  // By hand: a strip between two parallel slanted edges 101 mm apart, rows 4 mm high, cells 1024 mm wide. Every full row holds
  // 101/1024 of its cell, 98,632,812.5 billionths, half up …813. The edges cross row sides at thirds of a millimetre, so
  // the sums in double precision are rounded. The last row is cut at half its height: 49,316,406.25 billionths.
  test("a share exactly on half a billionth is rounded up even where the boundary crosses sides at thirds of a millimetre", () => {
    const cells = measuredCells(one(100, 0, 201, 0, 211, 30, 110, 30), rectangles(1024, 4));
    expect(cells.map(({ row, share }) => [row, share])).toEqual([
      [7, 49_316_406],
      ...[6, 5, 4, 3, 2, 1, 0].map((row) => [row, 98_632_813]),
    ]);
  });

  // By hand: 1 mm² of 10¹⁴ mm² is 0.00001 billionths: rounds to 0, but the square from the centre to its north-east holds it.
  test("a cell whose share rounds to nothing is in by its centre alone", () => {
    const centre = 5_000_000;
    const area = one(centre, centre, centre + 1, centre, centre + 1, centre + 1, centre, centre + 1);
    const spec = rectangles(10_000_000, 10_000_000);
    expect(measuredCells(area, spec)).toEqual([{ column: 0, row: 0, share: 0, centre: true }]);
    expect(selectCells(measureCells(area, spec), { rule: "centre" }, []).units).toBe(1);
    expect(() => selectCells(measureCells(area, spec), { rule: "touch" }, [])).toThrow("No cell meets the edge rule");
  });

  test("the direction of the rings does not matter", () => {
    const ring = [0, 0, 35, 3, 30, 33, 4, 28];
    const backwards = [4, 28, 30, 33, 35, 3, 0, 0];
    expect(measuredCells(one(...backwards), rectangles(10, 10))).toEqual(
      measuredCells(one(...ring), rectangles(10, 10)),
    );
  });
});

/** The number that gives 1 modulo `modulus` when multiplied by `value`; null where there is none. Euclid's algorithm. */
function inverse(value: number, modulus: number): number | null {
  let [a, b, x, y] = [BigInt(value % modulus), BigInt(modulus), 1n, 0n];
  while (b !== 0n) [a, b, x, y] = [b, a % b, y, x - (a / b) * y];
  return a === 1n ? Number(((x % BigInt(modulus)) + BigInt(modulus)) % BigInt(modulus)) : null;
}

describe("centres, half-open", () => {
  // By hand: cells of 10 mm with centres at 5, 15, 25; the square 5 … 15 has the centre (5, 5) at its lower left corner,
  // (15, 5) on its right, (5, 15) on its upper edge, (15, 15) at its upper right corner.
  test("a centre on the left or lower edge is in, on the right or upper edge out", () => {
    const cells = measuredCells(one(5, 5, 15, 5, 15, 15, 5, 15), rectangles(10, 10));
    expect(cells.filter(({ centre }) => centre)).toEqual([{ column: 0, row: 0, share: 250_000_000, centre: true }]);
  });

  // The edge (0, 0) → (Δx, Δy) crosses the centre's height 1/Δy of a millimetre east (or west) of it: with Δx·height ≡ ±1 modulo Δy. The
  // products are near 10¹⁹, where neighbouring numbers in double precision are 2,048 apart. The area lies east of the edge.
  test("a centre that a long edge misses by less than a billionth of a millimetre falls on the right side", () => {
    const long = fc.integer({ min: 3_000_000_000, max: 9_000_000_000 });
    const missing = fc.tuple(long, long, fc.boolean()).filter(([deltaX, deltaY]) => inverse(deltaX, deltaY) !== null);
    fc.assert(
      fc.property(missing, ([deltaX, deltaY, isEast]) => {
        const height = isEast ? (inverse(deltaX, deltaY) ?? 0) : deltaY - (inverse(deltaX, deltaY) ?? 0);
        const product = BigInt(height) * BigInt(deltaX);
        const x = Number((isEast ? product - 1n : product + 1n) / BigInt(deltaY));
        const side = 900_000_000;
        const spec = rectangles(side, side, x - side / 2, height - side / 2);
        const cells = measuredCells(one(0, 0, deltaX + 1_000_000_000, 0, deltaX, deltaY), spec);
        const cell = cells.find(({ column, row }) => column === 0 && row === 0);
        expect(cell?.centre ?? false).toBe(!isEast);
      }),
      { numRuns: 100 },
    );
  });

  // A wandering border through lattice points and centres cuts a rectangle in two.
  test("two areas that share a border share no cell and lose none", () => {
    const border = fc.array(fc.tuple(fc.integer({ min: 1, max: 23 }), fc.integer({ min: 1, max: 23 })), {
      minLength: 0,
      maxLength: 8,
    });
    fc.assert(
      fc.property(border, (points) => {
        const ys = [...new Set(points.map(([, y]) => y))].sort((a, b) => a - b);
        const middle = ys
          .flatMap((y) => [points.find((point) => point[1] === y)?.[0] ?? 1, y])
          .map((value) => value * 5);
        const pairs = Array.from({ length: middle.length / 2 }, (_, i) => [middle[2 * i] ?? 0, middle[2 * i + 1] ?? 0]);
        const downwards = pairs.toReversed().flat();
        const west = one(0, 0, 60, 0, ...middle, 60, 120, 0, 120);
        const east = one(60, 0, 120, 0, 120, 120, 60, 120, ...downwards);
        const inside = (area: PlaneArea): string[] =>
          measuredCells(area, rectangles(10, 10))
            .filter(({ centre }) => centre)
            .map(({ column, row }) => `${column},${row}`);
        const both = [...inside(west), ...inside(east)];
        expect(new Set(both).size).toBe(144);
        expect(both.length).toBe(144);
      }),
      { numRuns: 300 },
    );
  });
});

describe("refusals", () => {
  test("a grid whose labels would pass 12 characters is refused before it is walked", () => {
    const area = one(0, 0, 1_000_000_000, 0, 1_000_000_000, 1_000_000_000);
    expect(() => measureCells(area, rectangles(20, 20))).toThrow(/labels of 12 characters/);
  });

  test("a boundary through more cells than a frame holds is refused before it is walked", () => {
    const teeth = Array.from({ length: 40 }, (_, i) => [i * 100, i % 2 === 0 ? 0 : 20_000_000]).flat();
    expect(() => measureCells(one(...teeth, 4000, -10, 0, -10), rectangles(2, 2))).toThrow(/boundary alone/);
  });

  test("odd sides, fractions and a side of nothing are refused with the value", () => {
    const area = one(0, 0, 10, 0, 10, 10);
    for (const side of [9, 10.5, 0, -4, Number.NaN]) {
      expect(() => measureCells(area, rectangles(side, 10))).toThrow(`The cell width is ${side} mm`);
    }
  });

  test("rings that overlap are told from a study area", () => {
    const square = [0, 0, 100, 0, 100, 100, 0, 100];
    expect(() => measureCells({ polygons: [[square], [square]] }, rectangles(10, 10))).toThrow(RangeError);
  });

  test("work that is cancelled ends with what the callback throws", () => {
    expect(() =>
      measureCells(one(0, 0, 100, 0, 100, 100), rectangles(10, 10), () => {
        throw new Error("stopped");
      }),
    ).toThrow("stopped");
  });
});
