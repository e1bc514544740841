import type { CellSpec } from "./cell-spec.ts";

/** A frame holds no more units than this. */
export const MOST_UNITS = 10_000_000;

/**
 * Cells row by row from the north, as pieces from west to east. A piece is a run of whole cells (share 1,000,000,000) or
 * one cell with a smaller share, so the size follows the boundary, not the number of cells; there is no object a cell.
 *
 * Row i (0 … rows − 1) is lattice row `topRow − i`; its pieces are `rowStart[i]` … `rowStart[i + 1] − 1`. Piece k covers
 * the lattice columns `leftColumn + first[k]` … `leftColumn + last[k]`.
 */
export interface CellRows {
  readonly leftColumn: number;
  readonly topRow: number;
  readonly columns: number;
  readonly rows: number;
  readonly rowStart: Int32Array;
  readonly first: Int32Array;
  readonly last: Int32Array;
  /** Share of each cell of the piece inside the area, in billionths (rule R3). */
  readonly share: Int32Array;
}

/** Every cell whose share rounds above 0 or whose centre is in, whatever the membership. */
export interface MeasuredCells extends CellRows {
  readonly spec: CellSpec;
  /** 1 where the centre of the piece's cells is in, half-open; a run of whole cells always is. */
  readonly centreIn: Uint8Array;
  /** Exact area of the study area, twice, in mm². */
  readonly twiceAreaMm2: bigint;
}

/**
 * The units of a frame. `leftColumn`, `topRow`, `columns` and `rows` are those of the lattice before single cells are
 * left out: labels count from its north-west corner (rule R4).
 */
export interface FrameCells extends CellRows {
  /** N. */
  readonly units: number;
  /** Units before each piece, one more entry than pieces; piece k holds the units `unitsBefore[k] + 1` … `unitsBefore[k + 1]`. */
  readonly unitsBefore: Int32Array;
}

/** A unit of a frame: its place in the list, on the lattice and on a map index. */
export interface FrameUnit {
  readonly unit: number;
  readonly column: number;
  readonly row: number;
  /** Billionths. */
  readonly share: number;
}

/** How many cells, and what they cover; areas in square metres of the plane. */
export interface FrameSummary {
  /** N. */
  readonly cells: number;
  /** Listed cells whose share is 1. */
  readonly wholeCells: number;
  /** Listed cells with a smaller share. */
  readonly edgeCells: number;
  /** What the estimate speaks for: the listed shares where counts are inside, whole cells otherwise. */
  readonly frameAreaM2: number;
  /** The study area. */
  readonly areaM2: number;
  /** Part of the study area that no listed cell holds. */
  readonly uncoveredM2: number;
  /** Part of the listed cells that lies outside the study area. */
  readonly outsideM2: number;
  /** Sum of the listed shares in billionths: a whole number, decimal. */
  readonly shareSumBillionths: bigint;
}
