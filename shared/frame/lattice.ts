import { boundsOf, type PlaneArea } from "#shared/geometry/rings.ts";
import { Problem } from "#shared/problem.ts";
import type { CellSpec } from "./cell-spec.ts";
import { cellLabel, LONGEST_LABEL } from "./label.ts";

/**
 * The part of a lattice that an area's bounds touch. Inside the walk all coordinates are millimetres from its south-west
 * corner, columns count from its west and rows from its south: small whole numbers, wherever the area lies.
 */
export interface Lattice {
  readonly width: number;
  readonly height: number;
  /** Plane coordinates of the south-west corner. */
  readonly baseX: number;
  readonly baseY: number;
  /** Lattice indices (rule R2) of the first column and row. */
  readonly leftColumn: number;
  readonly bottomRow: number;
  readonly columns: number;
  readonly rows: number;
}

/** Columns with five letters; it bounds the memory that a sparse area can ask for. */
const MOST_ACROSS = 12_356_630;

/** Throws a Problem `frame-too-large` where no label of 12 characters reaches the far corner. */
export function latticeOver(area: PlaneArea, spec: CellSpec): Lattice {
  const { minX, minY, maxX, maxY } = boundsOf(area);
  const { widthMm: width, heightMm: height, originEastMm, originNorthMm } = spec;
  const leftColumn = Math.floor((minX - originEastMm) / width);
  const bottomRow = Math.floor((minY - originNorthMm) / height);
  const columns = Math.max(1, Math.ceil((maxX - originEastMm) / width) - leftColumn);
  const rows = Math.max(1, Math.ceil((maxY - originNorthMm) / height) - bottomRow);
  if (columns > MOST_ACROSS || rows > MOST_ACROSS || cellLabel(columns - 1, rows - 1).length > LONGEST_LABEL) {
    throw new Problem(
      "frame-too-large",
      `The grid would have ${columns} columns and ${rows} rows, more than labels of ${LONGEST_LABEL} characters can name. Make the cells larger.`,
    );
  }
  return {
    width,
    height,
    baseX: originEastMm + leftColumn * width,
    baseY: originNorthMm + bottomRow * height,
    leftColumn,
    bottomRow,
    columns,
    rows,
  };
}
