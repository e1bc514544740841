import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import { EDGE_PRESETS, type CellAddress, type Membership } from "#shared/frame/cell-spec.ts";
import {
  cellCentre,
  cellCorners,
  labelOf,
  listPieces,
  listSha256,
  unitAt,
  unitOf,
  writeList,
} from "#shared/frame/list.ts";
import { measureCells } from "#shared/frame/measure.ts";
import { packCells, unpackCells } from "#shared/frame/pack.ts";
import { previewFrame } from "#shared/frame/preview.ts";
import { selectCells } from "#shared/frame/select.ts";
import { summarise } from "#shared/frame/summary.ts";
import type { PlaneArea } from "#shared/geometry/rings.ts";
import { billionths } from "#shared/units/metric.ts";
import { createHash } from "node:crypto";
import { areas, rectangles } from "./boundaries.ts";
import { listed } from "./listed.ts";

vi.setConfig({ testTimeout: 60_000 });

// By hand: cells of 10 × 10 mm. The area is 0 … 25 east, 0 … 20 north: columns 0 and 1 whole, column 2 half, rows 0 and 1.
//   row 1:  A1 whole  B1 whole  C1 half      units 1 2 3
//   row 0:  A2 whole  B2 whole  C2 half      units 4 5 6
const AREA: PlaneArea = { polygons: [[[0, 0, 25, 0, 25, 20, 0, 20]]] };
const SPEC = rectangles(10, 10);
const TOUCH: Membership = { rule: "touch" };
const measured = measureCells(AREA, SPEC);
const textOf = (cells: Parameters<typeof writeList>[0]): string => {
  const decoder = new TextDecoder();
  let text = "";
  writeList(cells, (bytes) => (text += decoder.decode(bytes)));
  return text;
};

describe("units", () => {
  test("are numbered row by row from the north, west to east, and their list has one line each", () => {
    const cells = selectCells(measured, TOUCH, []);
    expect(cells.units).toBe(6);
    expect(textOf(cells)).toBe(
      "0,1,1000000000,\n1,1,1000000000,\n2,1,500000000,\n0,0,1000000000,\n1,0,1000000000,\n2,0,500000000,\n",
    );
    expect(unitAt(cells, 3)).toEqual({ unit: 3, column: 2, row: 1, share: 500_000_000 });
    expect(unitOf(cells, 0, 0)).toBe(4);
    expect([unitOf(cells, 3, 0), unitOf(cells, 0, 2), unitOf(cells, -1, 1)]).toEqual([null, null, null]);
    expect(() => unitAt(cells, 0)).toThrow(RangeError);
    expect(() => unitAt(cells, 7)).toThrow(RangeError);
  });

  test("a cell left out is neither in the list nor in N, and no label moves", () => {
    const cells = selectCells(measured, TOUCH, [
      { column: 0, row: 1 },
      { column: 0, row: 0 },
      { column: 0, row: 0 },
      { column: 77, row: 0 },
    ]);
    expect(textOf(cells)).toBe("1,1,1000000000,\n2,1,500000000,\n1,0,1000000000,\n2,0,500000000,\n");
    expect(cells.units).toBe(4);
    expect(unitOf(cells, 1, 0)).toBe(3);
    expect(labelOf(cells, 1, 0)).toBe("B2");
  });

  // The edge rule "inside" takes columns 0 and 1; left-out addresses west of the frame, in its gap and east of it change nothing.
  test("a cell left out that is no member of the frame changes nothing", () => {
    const twoParts: PlaneArea = { polygons: [[[0, 0, 20, 0, 20, 10, 0, 10]], [[50, 0, 70, 0, 70, 10, 50, 10]]] };
    const all = measureCells(twoParts, SPEC);
    const outside = [-3, 3, 9].map((column) => ({ column, row: 0 }));
    expect(selectCells(all, { rule: "inside" }, outside)).toEqual(selectCells(all, { rule: "inside" }, []));
    expect(summarise(all, { rule: "inside" }, "whole", outside).cells).toBe(4);
  });

  test("leaving the whole north row out keeps the labels of the south row", () => {
    const cells = selectCells(
      measured,
      TOUCH,
      [0, 1, 2].map((column) => ({ column, row: 1 })),
    );
    expect(textOf(cells)).toBe("0,0,1000000000,\n1,0,1000000000,\n2,0,500000000,\n");
    expect(labelOf(cells, 2, 0)).toBe("C2");
  });

  test("leaving every cell out, and an edge rule that no cell meets, are refused", () => {
    const all = [0, 1].flatMap((row) => [0, 1, 2].map((column) => ({ column, row })));
    expect(() => selectCells(measured, TOUCH, all)).toThrow("Every cell is left out");
    expect(() => selectCells(measureCells(AREA, rectangles(1000, 1000)), { rule: "inside" }, [])).toThrow(
      "No cell meets",
    );
  });

  test("a share of a half takes cells of exactly a half, a billionth more does not", () => {
    const half = (atLeast: number): number =>
      selectCells(measured, { rule: "share", atLeast: billionths(atLeast) }, []).units;
    expect([half(500_000_000), half(500_000_001)]).toEqual([6, 4]);
    expect(() => half(0)).toThrow("The smallest share is 0 billionths");
  });

  test("the number at a place and the place of a number are each other's inverse, whatever is left out", () => {
    fc.assert(
      fc.property(areas(), fc.integer({ min: 0, max: 5 }), ({ spec, area }, every) => {
        const all = measureCells(area, spec);
        const members = listed(all).filter(({ share }) => share > 0);
        fc.pre(members.length > 0);
        const leftOut: CellAddress[] = members.filter((_, i) => i % (every + 2) === 1);
        const kept = members.filter((_, i) => i % (every + 2) !== 1);
        const cells = selectCells(all, TOUCH, leftOut);
        expect(cells.units).toBe(kept.length);
        kept.forEach(({ column, row, share }, i) => {
          expect(unitAt(cells, i + 1)).toEqual({ unit: i + 1, column, row, share });
          expect(unitOf(cells, column, row)).toBe(i + 1);
        });
        leftOut.forEach(({ column, row }) => expect(unitOf(cells, column, row)).toBeNull());
        const text = kept.map(({ column, row, share }) => `${column},${row},${share},\n`).join("");
        expect(textOf(cells)).toBe(text);
        expect(unpackCells(packCells(cells))).toEqual(cells);
      }),
      { numRuns: 150 },
    );
  });
});

describe("the list's text", () => {
  // 400 × 300 whole cells: some 2.5 MB, many buffers. The lines are written again here, the hash is Node's.
  test("of many buffers is the same in pieces, in one and in its hash", () => {
    const cells = selectCells(
      measureCells({ polygons: [[[-20, -20, 780, -20, 780, 580, -20, 580]]] }, rectangles(2, 2)),
      TOUCH,
      [],
    );
    const lines: string[] = [];
    for (let row = 289; row >= -10; row -= 1) {
      for (let column = -10; column < 390; column += 1) lines.push(`${column},${row},1000000000,\n`);
    }
    const text = lines.join("");
    expect(textOf(cells) === text).toBe(true);
    expect(Buffer.concat([...listPieces(cells)]).toString() === text).toBe(true);
    expect(listSha256(cells)).toBe(createHash("sha256").update(text).digest("hex"));
  });
});

describe("places of cells", () => {
  test("centre and corners are whole millimetres of the plane", () => {
    const spec = rectangles(10, 4, 3, -5);
    expect(cellCentre(spec, { column: -1, row: 2 })).toEqual({ eastMm: -2, northMm: 5 });
    expect(cellCorners(spec, { column: -1, row: 2 })).toEqual([
      { eastMm: -7, northMm: 3 },
      { eastMm: 3, northMm: 3 },
      { eastMm: 3, northMm: 7 },
      { eastMm: -7, northMm: 7 },
    ]);
  });
});

describe("packed cells", () => {
  test("damaged or unknown bytes are refused, not guessed at", () => {
    const packed = packCells(selectCells(measured, TOUCH, []));
    expect(packed[0]).toBe(1);
    expect(() => unpackCells(packed.slice(0, -1))).toThrow(RangeError);
    expect(() => unpackCells(Uint8Array.from([...packed, 0]))).toThrow(RangeError);
    expect(() => unpackCells(Uint8Array.from([2, ...packed.slice(1)]))).toThrow("format 2");
    expect(() => unpackCells(new Uint8Array(0))).toThrow(RangeError);
  });

  // A disc of 1,000 corners over 1,000 columns: the boundary passes some 4,000 cells of 785,000.
  test("take less than a tenth of a byte a cell when cells are many", () => {
    const ring = Array.from({ length: 1000 }, (_, i) => [
      Math.cos((i / 1000) * 2 * Math.PI),
      Math.sin((i / 1000) * 2 * Math.PI),
    ])
      .flat()
      .map((value) => Math.round(value * 5_000_000));
    const cells = selectCells(measureCells({ polygons: [[ring]] }, rectangles(10_000, 10_000)), TOUCH, []);
    expect(cells.units).toBeGreaterThan(785_000);
    expect(packCells(cells).length / cells.units).toBeLessThan(0.1);
  });
});

describe("summaries", () => {
  // By hand (see the figure above), in m²: cells of 10⁻⁴, area 5·10⁻⁴; clip lists all six: 5 cells' worth of shares, one cell's
  // worth outside; inside lists four: one cell's worth of the area is in no listed cell.
  test("tell what is spoken for, uncovered and outside, for each preset", () => {
    const { clip, centre, inside } = previewFrame(AREA, SPEC).presets;
    expect(clip).toEqual({
      cells: 6,
      wholeCells: 4,
      edgeCells: 2,
      frameAreaM2: 5e-4,
      areaM2: 5e-4,
      uncoveredM2: 0,
      outsideM2: 1e-4,
      shareSumBillionths: 5_000_000_000n,
    });
    // The centres of column 2 lie on the right side of the area: out.
    expect(centre).toMatchObject({ cells: 4, frameAreaM2: 4e-4, uncoveredM2: 1e-4, outsideM2: 0 });
    expect(inside).toEqual(centre);
  });

  // By hand: 2 of 6 mm is a third, 333,333,333 billionths, and a third of a billionth is lost by rounding: not uncovered ground.
  test("do not call the rounding of shares uncovered", () => {
    const third = measureCells({ polygons: [[[0, 0, 8, 0, 8, 6, 0, 6]]] }, rectangles(6, 6));
    const summary = summarise(third, TOUCH, "inside");
    expect([summary.shareSumBillionths, summary.uncoveredM2]).toEqual([1_333_333_333n, 0]);
  });

  test("leave out what is left out, and nothing that is no member", () => {
    const summary = summarise(measured, TOUCH, "inside", [
      { column: 2, row: 1 },
      { column: 0, row: 0 },
      { column: 0, row: 0 },
      { column: 9, row: 9 },
    ]);
    expect(summary).toMatchObject({ cells: 4, wholeCells: 3, edgeCells: 1, frameAreaM2: 3.5e-4, uncoveredM2: 1.5e-4 });
  });

  test("agree with the selected cells for any boundary and preset", () => {
    fc.assert(
      fc.property(areas(), ({ spec, area }) => {
        const { presets, measured: all } = previewFrame(area, spec);
        for (const [name, { membership }] of Object.entries(EDGE_PRESETS)) {
          const { cells, shareSumBillionths, wholeCells } = presets[name as keyof typeof presets];
          if (cells === 0) continue;
          const chosen = listed(selectCells(all, membership, []));
          expect(chosen.length).toBe(cells);
          expect(chosen.filter(({ share }) => share === 1_000_000_000).length).toBe(wholeCells);
          expect(chosen.reduce((sum, { share }) => sum + BigInt(share), 0n)).toBe(shareSumBillionths);
        }
      }),
      { numRuns: 150 },
    );
  });

  test("a frame above ten million units is counted for a preview but not made", () => {
    const large: PlaneArea = { polygons: [[[0, 0, 8000, 0, 8000, 8000, 0, 8000]]] };
    const { presets, measured: all } = previewFrame(large, rectangles(2, 2));
    expect(presets.clip.cells).toBe(16_000_000);
    expect(() => selectCells(all, TOUCH, [])).toThrow("The frame would hold 16000000 cells");
  });
});
