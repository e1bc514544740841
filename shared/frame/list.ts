import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex } from "@noble/hashes/utils.js";
import type { GridPoint } from "#shared/units/metric.ts";
import type { CellAddress, CellSpec } from "./cell-spec.ts";
import type { FrameCells, FrameUnit } from "./cells.ts";
import { cellLabel } from "./label.ts";
import { pieceOf } from "./member.ts";

const BUFFER_BYTES = 65_536;
/** A line is shorter: two signed numbers below 2⁵³, a share, three commas and a newline. */
const LONGEST_LINE = 64;
const COMMA = 44;
const MINUS = 45;
const ZERO = 48;
const NEWLINE = 10;

/** Bytes and how many of them are filled. */
interface Text {
  readonly bytes: Uint8Array<ArrayBuffer>;
  length: number;
}

function writeWhole(text: Text, value: number): void {
  const { bytes } = text;
  let at = text.length;
  let rest = value;
  if (rest < 0) {
    bytes[at] = MINUS;
    at += 1;
    rest = -rest;
  }
  let digits = 1;
  for (let bound = 10; bound <= rest; bound *= 10) digits += 1;
  text.length = at + digits;
  for (let place = at + digits - 1; place >= at; place -= 1) {
    const tenth = Math.floor(rest / 10);
    bytes[place] = ZERO + (rest - tenth * 10);
    rest = tenth;
  }
}

/** `,row,share,` and a newline: the same for all cells of a piece; the last comma stands before an empty stratum. */
function writeTail(tail: Text, row: number, share: number): void {
  tail.length = 0;
  for (const value of [row, share]) {
    tail.bytes[tail.length] = COMMA;
    tail.length += 1;
    writeWhole(tail, value);
  }
  tail.bytes[tail.length] = COMMA;
  tail.bytes[tail.length + 1] = NEWLINE;
  tail.length += 2;
}

/** Writes lines of a piece from `column` on until the piece or the buffer ends; gives the next column. */
function writeLines(text: Text, tail: Text, column: number, last: number): number {
  const { bytes } = text;
  let next = column;
  for (; next <= last && text.length <= BUFFER_BYTES - LONGEST_LINE; next += 1) {
    writeWhole(text, next);
    const at = text.length;
    for (let i = 0; i < tail.length; i += 1) bytes[at + i] = tail.bytes[i] ?? 0;
    text.length = at + tail.length;
  }
  return next;
}

/** The list's text in full buffers; each is overwritten when the next is asked for. */
function* fullBuffers(cells: FrameCells): Generator<Uint8Array> {
  const text: Text = { bytes: new Uint8Array(BUFFER_BYTES), length: 0 };
  const tail: Text = { bytes: new Uint8Array(LONGEST_LINE), length: 0 };
  for (let rowIndex = 0; rowIndex < cells.rows; rowIndex += 1) {
    const end = cells.rowStart[rowIndex + 1] ?? 0;
    for (let piece = cells.rowStart[rowIndex] ?? 0; piece < end; piece += 1) {
      writeTail(tail, cells.topRow - rowIndex, cells.share[piece] ?? 0);
      const last = cells.leftColumn + (cells.last[piece] ?? 0);
      let column = cells.leftColumn + (cells.first[piece] ?? 0);
      while (column <= last) {
        column = writeLines(text, tail, column, last);
        if (text.length <= BUFFER_BYTES - LONGEST_LINE) continue;
        yield text.bytes.subarray(0, text.length);
        text.length = 0;
      }
    }
  }
  if (text.length > 0) yield text.bytes.subarray(0, text.length);
}

/**
 * The list's text (rule R4) in order of units, one line `column,row,shareInBillionths,stratum` and a newline each; without
 * strata a line ends with the comma. The bytes given to `sink` are overwritten after it returns.
 */
export function writeList(cells: FrameCells, sink: (bytes: Uint8Array) => void): void {
  for (const bytes of fullBuffers(cells)) sink(bytes);
}

/** The list's text in pieces that stay as they are, for a file or a connection that takes its time. */
export function* listPieces(cells: FrameCells): Generator<Uint8Array> {
  for (const bytes of fullBuffers(cells)) yield bytes.slice();
}

/** SHA-256 of the list's text, in lower-case hexadecimal. `onProgress` is told after each buffer; what it throws ends the work. */
export function listSha256(cells: FrameCells, onProgress?: () => void): string {
  const hash = sha256.create();
  for (const bytes of fullBuffers(cells)) {
    hash.update(bytes);
    onProgress?.();
  }
  return bytesToHex(hash.digest());
}

/** The last index whose value is at most `wanted`, in values that never fall. */
function lastAtMost(values: Int32Array, wanted: number): number {
  let low = 0;
  let high = values.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((values[middle] ?? 0) <= wanted) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** The unit with a number 1 … N (rule R4). Throws a RangeError on another number. */
export function unitAt(cells: FrameCells, unit: number): FrameUnit {
  if (!Number.isInteger(unit) || unit < 1 || unit > cells.units) {
    throw new RangeError(`units are numbered 1 … ${cells.units}, got ${unit}`);
  }
  const piece = lastAtMost(cells.unitsBefore, unit - 1);
  const row = cells.topRow - lastAtMost(cells.rowStart, piece);
  const inPiece = unit - 1 - (cells.unitsBefore[piece] ?? 0);
  return {
    unit,
    column: cells.leftColumn + (cells.first[piece] ?? 0) + inPiece,
    row,
    share: cells.share[piece] ?? 0,
  };
}

/** Number of the unit at a place of the lattice; null where the frame has none. */
export function unitOf(cells: FrameCells, column: number, row: number): number | null {
  const piece = pieceOf(cells, { column, row });
  if (piece < 0) return null;
  return (cells.unitsBefore[piece] ?? 0) + (column - cells.leftColumn - (cells.first[piece] ?? 0)) + 1;
}

/** Label of a cell: column letters and row number from the north-west corner of the lattice before cells are left out. */
export function labelOf(cells: FrameCells, column: number, row: number): string {
  return cellLabel(column - cells.leftColumn, cells.topRow - row);
}

/** South-west, south-east, north-east and north-west corner of a cell. */
export function cellCorners(
  spec: CellSpec,
  { column, row }: CellAddress,
): readonly [GridPoint, GridPoint, GridPoint, GridPoint] {
  const west = spec.originEastMm + column * spec.widthMm;
  const south = spec.originNorthMm + row * spec.heightMm;
  const east = west + spec.widthMm;
  const north = south + spec.heightMm;
  return [
    { eastMm: west, northMm: south },
    { eastMm: east, northMm: south },
    { eastMm: east, northMm: north },
    { eastMm: west, northMm: north },
  ];
}

/** Centre of a cell: whole millimetres, because sides are even. */
export function cellCentre(spec: CellSpec, { column, row }: CellAddress): GridPoint {
  return {
    eastMm: spec.originEastMm + column * spec.widthMm + spec.widthMm / 2,
    northMm: spec.originNorthMm + row * spec.heightMm + spec.heightMm / 2,
  };
}
