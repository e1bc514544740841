import { twiceSignedArea, type PlaneArea } from "#shared/geometry/rings.ts";
import type { Lattice } from "./lattice.ts";

/** Rings in coordinates of a lattice's south-west corner, in memory that is used again by the next call. */
export interface LatticeRings {
  /** x0, y0, x1, y1 … of all rings, one after the other. */
  readonly xy: Float64Array;
  /** Ring k holds the corners ringStart[k] … ringStart[k + 1] − 1. */
  readonly ringStart: Int32Array;
  /** Per ring: the sign of an upward edge, so that the inside to the right of an edge counts as positive. */
  readonly upSign: Int8Array;
  readonly rings: number;
  /** Upper bound of how many pieces the edges fall into when they are cut at all cell sides. */
  readonly mostPieces: number;
  readonly twiceAreaMm2: bigint;
}

let xyBuffer = new Float64Array(0);

/** Moves the area's rings to the lattice and finds their orientations and exact area. */
export function ringsOnLattice(area: PlaneArea, lattice: Lattice): LatticeRings {
  const rings = area.polygons.flatMap((polygon) => polygon.map((ring, index) => ({ ring, isHole: index > 0 })));
  const numbers = rings.reduce((sum, { ring }) => sum + ring.length, 0);
  if (xyBuffer.length < numbers) xyBuffer = new Float64Array(numbers + (numbers >> 2));
  const ringStart = new Int32Array(rings.length + 1);
  const upSign = new Int8Array(rings.length);
  let at = 0;
  let twiceAreaMm2 = 0n;
  let mostPieces = 0;
  rings.forEach(({ ring, isHole }, index) => {
    const twice = twiceSignedArea(ring);
    const counterClockwise = twice > 0n;
    twiceAreaMm2 += counterClockwise === isHole ? -twice : twice;
    upSign[index] = counterClockwise === isHole ? 1 : -1;
    mostPieces += copyRing(ring, lattice, at);
    at += ring.length;
    ringStart[index + 1] = at / 2;
  });
  return { xy: xyBuffer, ringStart, upSign, rings: rings.length, mostPieces, twiceAreaMm2 };
}

function copyRing(ring: readonly number[], lattice: Lattice, at: number): number {
  const { baseX, baseY, width, height } = lattice;
  const xy = xyBuffer;
  let x1 = (ring[ring.length - 2] ?? 0) - baseX;
  let y1 = (ring[ring.length - 1] ?? 0) - baseY;
  let across = 0;
  let up = 0;
  for (let i = 0; i < ring.length; i += 2) {
    const x2 = (ring[i] ?? 0) - baseX;
    const y2 = (ring[i + 1] ?? 0) - baseY;
    xy[at + i] = x2;
    xy[at + i + 1] = y2;
    across += Math.abs(x2 - x1);
    up += Math.abs(y2 - y1);
    x1 = x2;
    y1 = y2;
  }
  return Math.ceil(across / width) + Math.ceil(up / height) + ring.length + ring.length / 2;
}
