import { expect, test } from "vitest";
import { MOST_UNITS } from "#shared/frame/cells.ts";
import { EDGE_PRESETS } from "#shared/frame/cell-spec.ts";
import { labelOf, unitAt } from "#shared/frame/list.ts";
import { previewFrame } from "#shared/frame/preview.ts";
import { selectCells } from "#shared/frame/select.ts";
import { ringsFromJson } from "#shared/geometry/rings.ts";
import { cellWords, findCell, labelRange, shareText } from "../../../src/features/frame/cell-words.ts";
import { scaleText, sideThatFits, speaksFor, tooManyText } from "../../../src/features/frame/frame-words.ts";
import { spec } from "../app/fixtures.ts";

const area = ringsFromJson([
  [
    [
      [0, 0],
      [100_000, 0],
      [100_000, 100_000],
      [0, 100_000],
    ],
  ],
]);
const cells30 = { ...spec.cells, widthMm: 30_000, heightMm: 30_000 };
const { presets, measured } = previewFrame(area, cells30);
const frame = selectCells(measured, EDGE_PRESETS.clip.membership, []);

// 100 m in cells of 30 m: four columns and rows touch, three have their centre (15, 45, 75 m) in, three lie wholly in.
// Centre and inside: 9 × 900 m² = 8 100 m² = 0.81 ha of 1 ha, so 0.19 ha is in no cell.
test("each preset's sentence says what the estimate will speak for", () => {
  expect(speaksFor("clip", presets.clip, "spikes", 1)).toBe(
    "The estimate will speak for all 1.00\u00a0ha of the study area: all spikes inside the boundary, the hole left out.",
  );
  expect(speaksFor("centre", presets.centre, "spikes", 0)).toBe(
    "The estimate will speak for 0.81\u00a0ha of whole cells: 0\u00a0m² of them lie outside the study area, and 0.19\u00a0ha of it is in no cell.",
  );
  expect(speaksFor("inside", presets.inside, "spikes", 0)).toBe(
    "The estimate will speak for 0.81\u00a0ha of the 1.00\u00a0ha: the 0.19\u00a0ha along the edge are in no cell, and nothing will be said of them.",
  );
});

// Cells grow with the inverse square of the side: 104 932 400 cells of 0.5 m need at least 0.5·√10.49324 = 1.6197 m.
test("too many cells are told with a side that fits, rounded up to two figures", () => {
  expect(tooManyText(500, 104_932_400)).toBe(
    "This makes 104\u202f932\u202f400 cells; a frame holds 10\u202f000\u202f000. Use 1.7\u00a0m or more.",
  );
});

test("the side that is offered keeps the frame below its limit and is an even number of millimetres", () => {
  for (const [side, cells] of [
    [2, 26_255_577_000],
    [100, 26_255_577],
    [1000, 10_000_001],
    [3, 11_000_000],
  ] as const) {
    const offered = sideThatFits(side, cells);
    expect(offered % 2).toBe(0);
    expect(cells * (side / offered) ** 2).toBeLessThanOrEqual(MOST_UNITS);
  }
});

test("areas on the plane are compared with those on the ellipsoid", () => {
  expect(scaleText(9993, 10_000)).toBe("areas come out 0.07\u00a0% small");
  expect(scaleText(10_012, 10_000)).toBe("areas come out 0.12\u00a0% large");
  expect(scaleText(10_000.4, 10_000)).toBe("areas come out true to 0.01\u00a0%");
});

test("a share is never rounded to none or all", () => {
  expect(shareText(1_000_000_000)).toBe("wholly inside");
  expect(shareText(794_000_000)).toBe("79.4\u00a0% inside");
  expect(shareText(1)).toBe("less than 0.1\u00a0% inside");
  expect(shareText(999_999_999)).toBe("more than 99.9\u00a0% inside");
});

// Four columns A–D and four rows from the north; D1 reaches from 90 to 120 m east and north: 10 × 10 m of 30 × 30 m inside, a ninth.
test("a cell is told by label, unit and share, and found again by either", () => {
  const corner = findCell(frame, "d1");
  if (corner === null) throw new Error("no cell D1");
  expect(cellWords(frame, corner)).toEqual({ title: "D1", note: "unit 4", text: "11.1\u00a0% inside" });
  for (let unit = 1; unit <= frame.units; unit += 1) {
    const { column, row } = unitAt(frame, unit);
    expect(findCell(frame, labelOf(frame, column, row))).toEqual({ column, row });
    expect(findCell(frame, String(unit))).toEqual({ column, row });
  }
});

test("what is no cell of the frame is not found", () => {
  for (const typed of ["E1", "A5", "0", "17", "A0", "", "?", "AAAAAAA1"]) expect(findCell(frame, typed)).toBeNull();
  expect(labelRange(frame)).toBe("A1 to D4");
});
