import { describe, expect, it } from "vitest";
import type { CellRows } from "#shared/frame/cells.ts";
import { eachPiece, flatRings, paintCells, thinnedRings, type Pen } from "../../../src/map/cell-paint.ts";

const GRID = { widthMm: 20_000, heightMm: 10_000, originEastMm: 3_000, originNorthMm: -4_000 };
const COLOURS = { line: "line", edge: "edge" };

/** Rows from the north: each a list of [first column, last column, share in billionths], columns from the west of the lattice. */
function rowsOf(
  leftColumn: number,
  topRow: number,
  rows: readonly (readonly (readonly [number, number, number])[])[],
): CellRows {
  const rowStart = [0];
  const pieces = rows.flatMap((row) => {
    rowStart.push((rowStart.at(-1) ?? 0) + row.length);
    return row;
  });
  return {
    leftColumn,
    topRow,
    columns: 1 + Math.max(...pieces.map(([, last]) => last)),
    rows: rows.length,
    rowStart: Int32Array.from(rowStart),
    first: Int32Array.from(pieces, ([first]) => first),
    last: Int32Array.from(pieces, ([, last]) => last),
    share: Int32Array.from(pieces, ([, , share]) => share),
  };
}

const WHOLE = 1_000_000_000;
// Five rows with a hole in the middle; columns 100 … 106, rows 48 … 52.
const CELLS = rowsOf(100, 52, [
  [
    [2, 2, 5],
    [3, 4, WHOLE],
  ],
  [[0, 6, WHOLE]],
  [
    [0, 1, WHOLE],
    [2, 2, 7],
    [4, 4, 9],
    [5, 6, WHOLE],
  ],
  [[0, 6, WHOLE]],
  [[6, 6, 1]],
]);

/** All cells whose square meets the tile, one by one, from the pieces. */
function seen(tile: { west: number; north: number; scale: number; size: number }): string[] {
  const cells: string[] = [];
  eachPiece(CELLS, GRID, tile, (row, first, last, edge) => {
    expect(first).toBeLessThanOrEqual(last);
    for (let column = first; column <= last; column += 1) cells.push(`${column},${row},${edge ? "edge" : "whole"}`);
  });
  return cells.sort();
}

/** The same by looking at every cell of every piece. */
function bruteForce(tile: { west: number; north: number; scale: number; size: number }): string[] {
  const span = tile.size / tile.scale;
  const cells: string[] = [];
  for (let i = 0; i < CELLS.rows; i += 1) {
    for (let k = CELLS.rowStart[i] ?? 0; k < (CELLS.rowStart[i + 1] ?? 0); k += 1) {
      for (
        let column = CELLS.leftColumn + (CELLS.first[k] ?? 0);
        column <= CELLS.leftColumn + (CELLS.last[k] ?? 0);
        column += 1
      ) {
        const row = CELLS.topRow - i;
        const west = 3 + column * 20;
        const south = -4 + row * 10;
        const meets =
          west <= tile.west + span && west + 20 > tile.west && south <= tile.north && south + 10 > tile.north - span;
        if (meets) cells.push(`${column},${row},${CELLS.share[k] === WHOLE ? "whole" : "edge"}`);
      }
    }
  }
  return cells.sort();
}

describe("cells of a tile", () => {
  it("are those that a look at every single cell finds, wherever the tile lies", () => {
    for (const west of [1900, 2003, 2010.5, 2055, 2100, 2143, 2200]) {
      for (const north of [470, 476, 490.5, 511, 525, 526, 540]) {
        for (const span of [5, 33, 400]) {
          const tile = { west, north, scale: 256 / span, size: 256 };
          expect(seen(tile), JSON.stringify(tile)).toEqual(bruteForce(tile));
        }
      }
    }
    expect(seen({ west: 2000, north: 600, scale: 0.1, size: 256 }).length).toBe(3 + 7 + 6 + 7 + 1);
  });
});

/** Notes what is drawn. */
function notingPen() {
  const log: string[] = [];
  const note =
    (name: string) =>
    (...values: (number | string)[]) => {
      log.push(
        `${name} ${values.map((value) => (typeof value === "number" ? Math.round(value * 100) / 100 : value)).join(" ")}`.trim(),
      );
    };
  const pen = {
    fillStyle: "",
    strokeStyle: "",
    lineWidth: 0,
    ...Object.fromEntries(
      ["rect", "beginPath", "moveTo", "lineTo", "closePath", "fill", "stroke", "clip", "save", "restore"].map(
        (name) => [name, note(name)],
      ),
    ),
  } as unknown as Pen;
  return { pen, log };
}

describe("painting", () => {
  it("tints only cells that the boundary cuts, in one fill", () => {
    const { pen, log } = notingPen();
    paintCells(pen, CELLS, GRID, { west: 2003, north: 526, scale: 0.2, size: 256 }, COLOURS, null);
    // Cell (102, 52): 40 m east of the corner, in the first row: 8 px, 4 × 2 px.
    expect(log.filter((one) => one.startsWith("rect"))).toEqual([
      "rect 8 0 4 2",
      "rect 8 4 4 2",
      "rect 16 4 4 2",
      "rect 24 8 4 2",
    ]);
    expect(log.filter((one) => one === "fill")).toHaveLength(1);
    expect(log).not.toContain("stroke");
  });

  it("draws cell lines from 6 px on, in one stroke", () => {
    const { pen, log } = notingPen();
    paintCells(pen, CELLS, GRID, { west: 2003, north: 526, scale: 0.6, size: 256 }, COLOURS, null);
    expect(log.filter((one) => one === "stroke")).toHaveLength(1);
  });

  it("does nothing at all where there is no cell", () => {
    const { pen, log } = notingPen();
    paintCells(pen, CELLS, GRID, { west: 5000, north: 526, scale: 1, size: 256 }, COLOURS, null);
    expect(log).toEqual([]);
  });

  // A ring far larger than the tile with many vertices beyond its sides: only a few are needed, and they enclose the same part of the tile.
  it("cuts to a long boundary with the vertices that matter for the tile, and to the same shape", () => {
    const ring = Array.from({ length: 4000 }, (_, k): [number, number] => {
      const angle = (2 * Math.PI * k) / 4000;
      return [Math.round(2_080_000 + 400_000 * Math.cos(angle)), Math.round(500_000 + 400_000 * Math.sin(angle))];
    });
    const { pen, log } = notingPen();
    const tile = { west: 2440, north: 520, scale: 2, size: 256 };
    const cells = rowsOf(121, 51, [[[0, 3, 5]], [[0, 3, 5]]]);
    paintCells(pen, cells, GRID, tile, COLOURS, flatRings([ring]));
    const vertices = log
      .slice(0, log.indexOf("clip evenodd"))
      .filter((one) => /^(move|line)To/.test(one))
      .map((one) => one.split(" ").slice(1).map(Number));
    expect(vertices.length).toBeGreaterThan(20);
    expect(vertices.length).toBeLessThan(600);
    for (const [px, py] of [
      [1, 100],
      [78, 40],
      [81, 40],
      [120, 128],
      [200, 200],
      [255, 5],
      [60, 250],
    ] as const) {
      const east = tile.west + px / 2;
      const north = tile.north - py / 2;
      const inCircle = Math.hypot(east - 2080, north - 500) < 400;
      expect(isInside(vertices, px, py), `${px},${py}`).toBe(inCircle);
    }
  });

  it("leaves out vertices nearer than 0.3 px and no others", () => {
    const flat = flatRings([
      [
        [0, 0],
        [100, 0],
        [1000, 0],
        [1000, 1000],
      ],
    ]);
    expect(thinnedRings(flat, 1).map((ring) => [...ring])).toEqual([[0, 0, 1, 0, 1, 1]]);
    expect(thinnedRings(flat, 10).map((ring) => [...ring])).toEqual([[0, 0, 0.1, 0, 1, 0, 1, 1]]);
  });
});

function isInside(vertices: readonly number[][], x: number, y: number): boolean {
  let inside = false;
  vertices.forEach(([x1 = 0, y1 = 0], index) => {
    const [x2 = 0, y2 = 0] = vertices[(index + 1) % vertices.length] ?? [];
    if (y1 > y !== y2 > y && x < x1 + ((y - y1) * (x2 - x1)) / (y2 - y1)) inside = !inside;
  });
  return inside;
}
