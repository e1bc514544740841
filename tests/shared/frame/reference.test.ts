import { existsSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import type { Membership } from "#shared/frame/cell-spec.ts";
import { listSha256, unitAt } from "#shared/frame/list.ts";
import { measureCells } from "#shared/frame/measure.ts";
import { selectCells } from "#shared/frame/select.ts";
import { summarise } from "#shared/frame/summary.ts";
import { nodeRings } from "#shared/geometry/noding.ts";
import { ringsFromJson, type PlaneArea } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import { billionths } from "#shared/units/metric.ts";
import { rectangles } from "./boundaries.ts";
import { listed } from "./listed.ts";

interface ExpectedRule {
  readonly N: number;
  readonly sha256_with_empty_stratum: string;
  readonly covered_area_m2: number;
  readonly first: readonly (readonly [number, number, number])[];
  readonly last: readonly (readonly [number, number, number])[];
}

interface ExpectedCase {
  readonly id: string;
  readonly rings_file: string;
  readonly cells_file: string | null;
  readonly cell_width_mm: number;
  readonly cell_height_mm: number;
  readonly origin_mm: readonly [number, number];
  readonly area_mm2_exact: string;
  readonly rules: Readonly<Record<string, ExpectedRule>>;
}

const here = new URL("../../reference/geometry/", import.meta.url);
const beside = new URL("../../../../shared/reference/geometry/", import.meta.url);

const casesIn = (folder: URL): ExpectedCase[] =>
  (JSON.parse(readFileSync(new URL("expected.json", folder), "utf8")) as { cases: ExpectedCase[] }).cases;

const areaIn = (folder: URL, file: string): PlaneArea =>
  ringsFromJson((JSON.parse(readFileSync(new URL(file, folder), "utf8")) as { polygons: unknown }).polygons);

function membershipNamed(name: string): Membership {
  if (name === "touch" || name === "centre" || name === "inside") return { rule: name };
  return { rule: "share", atLeast: billionths(Math.round(Number(name.slice("share:".length)) * 1e9)) };
}

const nameOf = (one: ExpectedCase): string =>
  `${one.id}, ${one.cell_width_mm} × ${one.cell_height_mm} mm from ${one.origin_mm.join(", ")}`;

/** Twice an area in mm² given as whole or as a fraction. */
function twice(text: string): bigint {
  const [numerator = "", denominator = "1"] = text.split("/");
  return (2n * BigInt(numerator)) / BigInt(denominator);
}

function checkCase(folder: URL, one: ExpectedCase): void {
  const spec = rectangles(one.cell_width_mm, one.cell_height_mm, ...one.origin_mm);
  const raw = areaIn(folder, one.rings_file);
  const noded = nodeRings(raw.polygons.flat());
  for (const area of [raw, noded]) {
    const measured = measureCells(area, spec);
    expect(measured.twiceAreaMm2).toBe(twice(one.area_mm2_exact));
    for (const [rule, expected] of Object.entries(one.rules)) {
      const membership = membershipNamed(rule);
      expect(summarise(measured, membership, "whole").cells, rule).toBe(expected.N);
      if (expected.N === 0) {
        expect(() => selectCells(measured, membership, []), rule).toThrow(Problem);
        continue;
      }
      const cells = selectCells(measured, membership, []);
      expect(cells.units, rule).toBe(expected.N);
      expect(listSha256(cells), rule).toBe(expected.sha256_with_empty_stratum);
      const ends = [
        ...expected.first.map((_, i) => i + 1),
        ...expected.last.map((_, i) => expected.N - expected.last.length + i + 1),
      ];
      expect(
        ends.map((unit) => unitAt(cells, unit)),
        rule,
      ).toEqual(
        [...expected.first, ...expected.last].map(([column, row, share], i) => ({ unit: ends[i], column, row, share })),
      );
    }
  }
}

/** `col,row,shareInBillionths,centre,area_mm2`: every cell with any overlap. */
function checkCells(folder: URL, one: ExpectedCase, file: string): void {
  const spec = rectangles(one.cell_width_mm, one.cell_height_mm, ...one.origin_mm);
  const measured = measureCells(areaIn(folder, one.rings_file), spec);
  const found = listed(measured)
    .map(
      ({ column, row, share, piece }) => `${column},${row},${share},${measured.centreIn[piece] === 1 ? "in" : "out"}`,
    )
    .filter((line) => !line.endsWith(",0,out"));
  const expected = readFileSync(new URL(file, folder), "utf8")
    .trim()
    .split("\n")
    .slice(1)
    .map((line) => line.replace(" (on an edge)", "").split(",").slice(0, 4).join(","))
    .filter((line) => !line.endsWith(",0,out"));
  expect(found).toEqual(expected);
}

// Outside values: two independent exact computations in Python (tests/reference/README.md, geometry/).
describe("frames of the reference boundaries, as they came and noded", () => {
  test.each(casesIn(here).map((one) => [nameOf(one), one] as const))(
    "%s: N, first and last units and list hash for every edge rule, and the exact area",
    (_, one) => checkCase(here, one),
  );

  test.each(casesIn(here).flatMap((one) => (one.cells_file === null ? [] : [[one.cells_file, one] as const])))(
    "%s: every cell's share and centre",
    (file, one) => checkCells(here, one, file),
  );
});

// This boundary may not be copied into the repository.
const besideIsThere = existsSync(new URL("nc_dare.rings_mm.json", beside));
describe.skipIf(!besideIsThere)("frames of a reference boundary that lies beside the repository", () => {
  test("nc_dare: N and list hash for every edge rule", () => {
    for (const one of casesIn(beside).filter(({ id }) => id === "nc_dare")) {
      checkCase(beside, one);
      if (one.cells_file !== null) checkCells(beside, one, one.cells_file);
    }
  });
});
