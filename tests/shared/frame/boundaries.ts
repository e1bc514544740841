import fc from "fast-check";
import { nodeRings } from "#shared/geometry/noding.ts";
import { areaOf, type PlaneArea, type Ring } from "#shared/geometry/rings.ts";
import type { CellSpec } from "#shared/frame/cell-spec.ts";

export function rectangles(widthMm: number, heightMm: number, originEastMm = 0, originNorthMm = 0): CellSpec {
  return { shape: "rectangle", widthMm, heightMm, originEastMm, originNorthMm, rotationMicroDegrees: 0 };
}

/** Cells and rings whose corners fall on lattice points, on centres, on sides and in between. */
export interface Boundary {
  readonly spec: CellSpec;
  readonly rings: readonly Ring[];
}

const sides = fc.constantFrom(2, 4, 6, 10, 34, 1000, 1024, 99_998);

/** A coordinate in quarters of a side (so lattice points and centres are frequent) plus a small push. */
const place = (side: number, most: number): fc.Arbitrary<number> =>
  fc
    .tuple(fc.integer({ min: 0, max: 4 * most }), fc.constantFrom(0, 0, 0, 0, 1, -1, 3, 17))
    .map(([quarters, push]) => Math.floor((quarters * side) / 4) + push);

export const boundaries = (most = 7, corners = 9): fc.Arbitrary<Boundary> =>
  fc
    .record({ width: sides, height: sides, rings: fc.integer({ min: 1, max: 3 }) })
    .chain(({ width, height, rings }) =>
      fc.record({
        spec: fc
          .tuple(fc.integer({ min: -3 * width, max: 3 * width }), fc.integer({ min: -3 * height, max: 3 * height }))
          .map(([east, north]) => rectangles(width, height, east, north)),
        shift: fc.constantFrom<readonly [number, number]>(
          [0, 0],
          [-5 * width, -5 * height],
          [7_000_000_001, -9_000_000_013],
        ),
        rings: fc.array(
          fc.array(fc.tuple(place(width, most), place(height, most)), { minLength: 3, maxLength: corners }),
          { minLength: rings, maxLength: rings },
        ),
      }),
    )
    .map(({ spec, shift, rings }) => ({
      spec: {
        ...spec,
        originEastMm: spec.originEastMm + shift[0],
        originNorthMm: spec.originNorthMm + shift[1],
      },
      rings: rings.map((ring) => ring.flatMap(([x, y]) => [x + shift[0], y + shift[1]])),
    }));

/** Noded, not empty. */
export const areas = (most?: number, corners?: number): fc.Arbitrary<{ spec: CellSpec; area: PlaneArea }> =>
  boundaries(most, corners)
    .map(({ spec, rings }) => ({ spec, area: nodeRings(rings) }))
    .filter(({ area }) => areaOf(area).twiceMm2 > 0n);
