import { readCsv } from "#shared/exchange/csv.ts";
import type { CellAddress } from "#shared/frame/cell-spec.ts";
import type { FrameCells } from "#shared/frame/cells.ts";
import { labelOf, unitOf } from "#shared/frame/list.ts";
import { columnLetters } from "#shared/frame/label.ts";
import { Problem } from "#shared/problem.ts";

export interface LeftOut extends CellAddress {
  readonly reason: string;
}

/**
 * Cells to leave out: a table with the columns `column,row,reason` or `label,reason`, labels being those of the lattice
 * before any cell is left out.
 * @throws Problem that names the line: no such cell, the same cell twice, or no reason.
 */
export function readLeftOut(bytes: Uint8Array, cells: FrameCells): LeftOut[] {
  const { value: table } = readCsv(bytes);
  const titles = table.header.map((title) => title.trim().toLowerCase());
  const at = { column: titles.indexOf("column"), row: titles.indexOf("row"), label: titles.indexOf("label") };
  const reasonAt = titles.indexOf("reason");
  const byLabel = at.label !== -1;
  if (reasonAt === -1 || (!byLabel && (at.column === -1 || at.row === -1))) {
    throw new Problem("table-unreadable", "Name the columns column,row,reason or label,reason.");
  }
  const seen = new Set<string>();
  return table.rows.map((row, place) => {
    const line = `Line ${table.lines[place] ?? place + 2}`;
    const text = (index: number): string => (row[index] ?? "").trim();
    const address = byLabel
      ? addressOf(text(at.label), cells)
      : { column: whole(text(at.column)), row: whole(text(at.row)) };
    if (address.column === null || address.row === null || unitOf(cells, address.column, address.row) === null) {
      const name = byLabel ? `"${text(at.label)}"` : `column ${text(at.column)}, row ${text(at.row)}`;
      throw new Problem("input-invalid", `${line}: the frame has no cell ${name}. Correct it or take the line out.`);
    }
    const label = labelOf(cells, address.column, address.row);
    if (seen.has(label)) throw new Problem("input-invalid", `${line}: the cell ${label} stands here twice.`);
    seen.add(label);
    const reason = text(reasonAt);
    if (reason === "") throw new Problem("reason-needed", `${line}: say why the cell ${label} is left out.`);
    return { column: address.column, row: address.row, reason };
  });
}

const whole = (text: string): number | null => (/^-?\d{1,9}$/.test(text) ? Number(text) : null);

/** "AB27" on the lattice of the frame. */
function addressOf(label: string, cells: FrameCells): { column: number | null; row: number | null } {
  const match = /^([A-Z]{1,6})([1-9]\d{0,8})$/.exec(label.toUpperCase());
  if (match === null) return { column: null, row: null };
  const letters = match[1] ?? "";
  const fromWest = Array.from(letters).reduce((sum, letter) => sum * 26 + letter.charCodeAt(0) - 64, 0) - 1;
  if (columnLetters(fromWest) !== letters) throw new RangeError(`letters ${letters} are not column ${fromWest}`);
  return { column: cells.leftColumn + fromWest, row: cells.topRow - (Number(match[2]) - 1) };
}
