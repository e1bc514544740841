/** A label has at most this many characters (rule R4). */
export const LONGEST_LABEL = 12;

/** Column 0 is A, 25 is Z, 26 is AA, as on a map index and in a spreadsheet. Throws a RangeError below 0. */
export function columnLetters(columnFromWest: number): string {
  if (!Number.isInteger(columnFromWest) || columnFromWest < 0) {
    throw new RangeError(`a column counts from 0, got ${columnFromWest}`);
  }
  let letters = "";
  for (let rest = columnFromWest + 1; rest > 0; rest = Math.floor((rest - 1) / 26)) {
    letters = String.fromCharCode(65 + ((rest - 1) % 26)) + letters;
  }
  return letters;
}

/** Label of the cell `columnFromWest` columns east and `rowFromNorth` rows south of the north-west corner: (0, 0) is A1. */
export function cellLabel(columnFromWest: number, rowFromNorth: number): string {
  if (!Number.isInteger(rowFromNorth) || rowFromNorth < 0) {
    throw new RangeError(`a row counts from 0, got ${rowFromNorth}`);
  }
  return `${columnLetters(columnFromWest)}${rowFromNorth + 1}`;
}
