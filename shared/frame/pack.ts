import { WHOLE_CELL } from "#shared/units/metric.ts";
import type { FrameCells } from "./cells.ts";

/** The first byte of packed cells. Old formats stay readable for ever. */
export const CELLS_FORMAT = 1;

/**
 * Format 1: the format's number, then whole numbers in 7-bit groups, lowest first, the high bit set on all but the last group:
 * units, left column and top row (zigzag: 0, −1, 1, −2 … as 0, 1, 2, 3 …), columns, rows; then for each row from the north its
 * number of pieces, and for each piece 2·gap + kind, gap being the columns between it and the piece before (or the west): kind 0
 * is a run of whole cells and its length follows, kind 1 a single cell and its share follows.
 */
export function packCells(cells: FrameCells): Uint8Array<ArrayBuffer> {
  const bytes = new ByteWriter(64 + cells.rows + 8 * cells.first.length);
  bytes.whole(CELLS_FORMAT);
  bytes.whole(cells.units);
  bytes.whole(zigzag(cells.leftColumn));
  bytes.whole(zigzag(cells.topRow));
  bytes.whole(cells.columns);
  bytes.whole(cells.rows);
  for (let row = 0; row < cells.rows; row += 1) {
    const start = cells.rowStart[row] ?? 0;
    const end = cells.rowStart[row + 1] ?? 0;
    bytes.whole(end - start);
    let next = 0;
    for (let piece = start; piece < end; piece += 1) {
      const first = cells.first[piece] ?? 0;
      const last = cells.last[piece] ?? 0;
      const share = cells.share[piece] ?? 0;
      const isRun = share === WHOLE_CELL;
      bytes.whole(2 * (first - next) + (isRun ? 0 : 1));
      bytes.whole(isRun ? last - first + 1 : share);
      next = last + 1;
    }
  }
  return bytes.filled();
}

/** Throws a RangeError on bytes that are no packed cells of a known format, or are damaged. */
export function unpackCells(packed: Uint8Array): FrameCells {
  const bytes = new ByteReader(packed);
  const format = bytes.whole();
  if (format !== CELLS_FORMAT) throw new RangeError(`packed cells of format ${format} cannot be read`);
  const units = bytes.whole();
  const leftColumn = unzigzag(bytes.whole());
  const topRow = unzigzag(bytes.whole());
  const columns = bytes.whole();
  const rows = bytes.whole();
  // A row takes a byte or more, a piece two bytes or more: damaged counts can't ask for more memory than that.
  if (rows > packed.length) throw new RangeError(`packed cells of ${packed.length} bytes cannot hold ${rows} rows`);
  const most = packed.length >> 1;
  const first = new Int32Array(most);
  const last = new Int32Array(most);
  const share = new Int32Array(most);
  const unitsBefore = new Int32Array(most + 1);
  const rowStart = new Int32Array(rows + 1);
  let count = 0;
  for (let row = 0; row < rows; row += 1) {
    let next = 0;
    for (let left = bytes.whole(); left > 0; left -= 1) {
      const head = bytes.whole();
      const value = bytes.whole();
      const isRun = head % 2 === 0;
      const length = isRun ? value : 1;
      first[count] = next + Math.floor(head / 2);
      next += Math.floor(head / 2) + length;
      last[count] = next - 1;
      share[count] = isRun ? WHOLE_CELL : value;
      if (next > columns) throw new RangeError(`packed cells are damaged in row ${row}`);
      unitsBefore[count + 1] = (unitsBefore[count] ?? 0) + length;
      count += 1;
    }
    rowStart[row + 1] = count;
  }
  if (!bytes.atEnd() || unitsBefore[count] !== units) throw new RangeError("packed cells are damaged at their end");
  return {
    leftColumn,
    topRow,
    columns,
    rows,
    rowStart,
    first: first.slice(0, count),
    last: last.slice(0, count),
    share: share.slice(0, count),
    units,
    unitsBefore: unitsBefore.slice(0, count + 1),
  };
}

const zigzag = (value: number): number => (value < 0 ? -2 * value - 1 : 2 * value);
const unzigzag = (value: number): number => (value % 2 === 0 ? value / 2 : -(value + 1) / 2);

class ByteWriter {
  private bytes: Uint8Array<ArrayBuffer>;
  private length = 0;

  constructor(room: number) {
    this.bytes = new Uint8Array(room);
  }

  whole(value: number): void {
    if (this.length + 8 > this.bytes.length) {
      const larger = new Uint8Array(2 * this.bytes.length);
      larger.set(this.bytes);
      this.bytes = larger;
    }
    let rest = value;
    while (rest >= 128) {
      const high = Math.floor(rest / 128);
      this.bytes[this.length] = rest - high * 128 + 128;
      this.length += 1;
      rest = high;
    }
    this.bytes[this.length] = rest;
    this.length += 1;
  }

  filled(): Uint8Array<ArrayBuffer> {
    return this.bytes.slice(0, this.length);
  }
}

class ByteReader {
  private at = 0;
  private readonly bytes: Uint8Array;

  constructor(bytes: Uint8Array) {
    this.bytes = bytes;
  }

  whole(): number {
    let value = 0;
    for (let place = 1; place < Number.MAX_SAFE_INTEGER; place *= 128) {
      const byte = this.bytes[this.at];
      if (byte === undefined) throw new RangeError("packed cells end early");
      this.at += 1;
      value += (byte % 128) * place;
      if (byte < 128) return value;
    }
    throw new RangeError(`packed cells hold a number that is too long at byte ${this.at}`);
  }

  atEnd(): boolean {
    return this.at === this.bytes.length;
  }
}
