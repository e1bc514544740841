import { area as areaInM2, featureCollection, intersect, polygon, squareGrid } from "@turf/turf";
import type { CellSpec } from "#shared/frame/cell-spec.ts";
import { listSha256 } from "#shared/frame/list.ts";
import { measureCells } from "#shared/frame/measure.ts";
import { packCells } from "#shared/frame/pack.ts";
import { selectCells } from "#shared/frame/select.ts";
import { findCrossing, nodeRings } from "#shared/geometry/noding.ts";
import type { PlaneArea, Ring } from "#shared/geometry/rings.ts";

/** One row of the table of measures: ours, and a general library's in the same run where there is one that does the same. */
export interface BenchRow {
  readonly name: string;
  readonly ms: number;
  readonly beside?: { readonly name: string; readonly ms: number };
}

/** A coast-like ring with so many corners, about 2·radius across, in whole millimetres. */
function coast(corners: number, radiusMm: number): Ring {
  return Array.from({ length: corners }, (_, i) => {
    const angle = (2 * Math.PI * i) / corners;
    const bays = 0.75 + 0.15 * Math.sin(3 * angle) + 0.06 * Math.sin(17 * angle) + 0.03 * Math.sin(101 * angle);
    return [Math.round(radiusMm * bays * Math.cos(angle)), Math.round(radiusMm * bays * Math.sin(angle))];
  }).flat();
}

/** Squares so large that about so many of them touch the ring's inside. */
function squaresFor(cells: number, radiusMm: number): CellSpec {
  const side = 2 * Math.round((radiusMm * Math.sqrt((Math.PI * 0.576) / cells)) / 2);
  return {
    shape: "rectangle",
    widthMm: side,
    heightMm: side,
    originEastMm: 0,
    originNorthMm: 0,
    rotationMicroDegrees: 0,
  };
}

/** Median of so many runs, after two to warm up. */
function timed(runs: number, work: () => void): number {
  const times: number[] = [];
  for (let run = -2; run < runs; run += 1) {
    const start = performance.now();
    work();
    if (run >= 0) times.push(performance.now() - start);
  }
  return times.sort((a, b) => a - b)[times.length >> 1] ?? 0;
}

function measuring(corners: number, cells: number): BenchRow {
  const radius = 20_000_000;
  const area: PlaneArea = { polygons: [[coast(corners, radius)]] };
  const spec = squaresFor(cells, radius);
  return {
    name: `all shares and centres, ${corners} corners × ${cells} cells`,
    ms: timed(15, () => void measureCells(area, spec)),
  };
}

/** Every so manieth cell goes through turf; its time is multiplied. */
const TURF_SAMPLE = 200;

/** The same small frame by turf's squareGrid and intersect, in degrees near the equator, where a millimetre is about 9e-9°. */
function besideTurf(): BenchRow {
  const [corners, cells, radius] = [1000, 10_000, 2_000_000];
  const ring = coast(corners, radius);
  const spec = squaresFor(cells, radius);
  const ours = timed(51, () => void measureCells({ polygons: [[ring]] }, spec));
  const degrees = Array.from({ length: corners + 1 }, (_, i) => [
    (ring[(2 * i) % ring.length] ?? 0) / 111_319_491,
    (ring[(2 * i + 1) % ring.length] ?? 0) / 111_319_491,
  ]);
  const start = performance.now();
  const shape = polygon([degrees]);
  const grid = squareGrid([-0.018, -0.018, 0.018, 0.018], spec.widthMm / 1e6, { units: "kilometers" }).features;
  const gridMs = performance.now() - start;
  let sum = 0;
  for (let i = 0; i < grid.length; i += TURF_SAMPLE) {
    const cell = grid[i];
    const common = cell === undefined ? null : intersect(featureCollection([shape, cell]));
    if (common !== null && cell !== undefined) sum += areaInM2(common) / areaInM2(cell);
  }
  if (sum * TURF_SAMPLE < cells / 2) throw new Error(`turf found only ${sum * TURF_SAMPLE} cells' worth of area`);
  const ms = gridMs + TURF_SAMPLE * (performance.now() - start - gridMs);
  const beside = { name: `turf squareGrid + intersect (1 cell in ${TURF_SAMPLE}, multiplied)`, ms };
  return { name: `all shares and centres, ${corners} corners × ${cells} cells`, ms: ours, beside };
}

function listing(): BenchRow[] {
  const radius = 20_000_000;
  const spec = squaresFor(1_000_000, radius);
  const cells = selectCells(measureCells({ polygons: [[coast(10_000, radius)]] }, spec), { rule: "touch" }, []);
  return [
    { name: `list and its SHA-256, ${cells.units} cells`, ms: timed(3, () => void listSha256(cells)) },
    {
      name: `packed cells, ${cells.units} cells, ${packCells(cells).length} bytes`,
      ms: timed(5, () => void packCells(cells)),
    },
  ];
}

function noding(): BenchRow[] {
  const ring = coast(100_000, 20_000_000);
  const area = nodeRings([ring]);
  return [
    { name: "noding, 100000 corners", ms: timed(1, () => void nodeRings([ring])) },
    { name: "test for crossings, 100000 corners", ms: timed(1, () => void findCrossing(area)) },
  ];
}

/** Times of the frame engine. */
export function benchFrame(): Promise<BenchRow[]> {
  return Promise.resolve([
    measuring(10_000, 1_000_000),
    measuring(100_000, 10_000_000),
    besideTurf(),
    ...listing(),
    ...noding(),
  ]);
}
