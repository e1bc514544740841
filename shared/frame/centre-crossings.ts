import type { LatticeRings } from "./edges.ts";
import { divided, multiplyDivide } from "./exact-division.ts";
import type { Lattice } from "./lattice.ts";
import type { CentreRecords } from "./walk-records.ts";

/**
 * Where the boundary crosses the centre lines of rows (rule R3, half-open): an edge crosses the line at height yc if and
 * only if (y1 ≤ yc) ≠ (y2 ≤ yc), and toggles all centres at or right of the crossing. So a centre on a left or lower edge
 * is in, on a right or upper edge out. Sizes are even, so centre lines are whole millimetres.
 */
export function crossCentreLines(rings: LatticeRings, lattice: Lattice, records: CentreRecords): void {
  const { xy, ringStart } = rings;
  const { height } = lattice;
  const half = height / 2;
  for (let ring = 0; ring < rings.rings; ring += 1) {
    const start = ringStart[ring] ?? 0;
    const end = ringStart[ring + 1] ?? 0;
    let x1 = xy[2 * end - 2] ?? 0;
    let y1 = xy[2 * end - 1] ?? 0;
    for (let i = start; i < end; i += 1) {
      const x2 = xy[2 * i] ?? 0;
      const y2 = xy[2 * i + 1] ?? 0;
      // Rows whose centre line is at or above y: the first is ⌈(y − half)/height⌉.
      const first = Math.floor((y1 + half - 1) / height);
      const last = Math.floor((y2 + half - 1) / height);
      if (first < last) crossRows(x1, y1, x2, y2, first, last, lattice, records);
      else if (last < first) crossRows(x2, y2, x1, y1, last, first, lattice, records);
      x1 = x2;
      y1 = y2;
    }
  }
}

/** An upward edge crosses the centre lines of the rows `first` … `last − 1`. */
function crossRows(
  x1: number,
  y1: number,
  x2: number,
  y2: number,
  first: number,
  last: number,
  lattice: Lattice,
  records: CentreRecords,
): void {
  const { width, height, columns } = lattice;
  const deltaX = Math.abs(x2 - x1);
  const deltaY = y2 - y1;
  const west = x2 < x1;
  multiplyDivide(first * height + height / 2 - y1, deltaX, deltaY);
  let moved = divided[0] ?? 0;
  let rest = divided[1] ?? 0;
  multiplyDivide(height, deltaX, deltaY);
  const step = divided[0] ?? 0;
  const stepRest = divided[1] ?? 0;
  for (let row = first; row < last; row += 1) {
    // A centre is whole, so "at or right of the crossing" means at or right of the crossing rounded up.
    const roundedUp = west ? x1 - moved : x1 + moved + (rest > 0 ? 1 : 0);
    const column = Math.floor((roundedUp + width / 2 - 1) / width);
    if (column < columns) {
      const at = records.count;
      records.count = at + 1;
      records.column[at] = column;
      records.row[at] = row;
    }
    moved += step;
    rest += stepRest;
    if (rest >= deltaY) {
      rest -= deltaY;
      moved += 1;
    }
  }
}
