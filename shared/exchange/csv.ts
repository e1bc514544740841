import { Problem } from "#shared/problem.ts";
import { MOST_ROWS, csvRecords, type CsvRecord } from "./csv-records.ts";
import { convertDecimalCommas } from "./decimal-comma.ts";
import { decodeText } from "./text-bytes.ts";

export type CsvValue = string | number | null;

/** What a spreadsheet would run or read as a formula; apostrophes before it are counted in, so that reading can undo it. */
const FORMULA = /^'*[=+\-@\t\r＝＋－＠]/;
/** A number written out is no formula. */
const NUMBER = /^[+-]?\d+(?:\.\d+)?(?:[eE][+-]?\d+)?$/;

function written(value: CsvValue): string {
  if (value === null) return "";
  if (typeof value === "number") {
    if (!Number.isFinite(value)) throw new RangeError(`a table holds finite numbers, got ${value}`);
    return String(value);
  }
  const text = FORMULA.test(value) && !NUMBER.test(value) ? `'${value}` : value;
  return /[",\r\n;\t]|^\s|\s$/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/**
 * A table as CSV (RFC 4180: comma, CR LF). Numbers stay numbers; text that a spreadsheet would run as a formula gets an
 * apostrophe in front, which `readCsv` takes off again; null is an empty cell.
 * @param options byteOrderMark: for spreadsheets that else read UTF-8 as their local encoding
 * @throws RangeError for a row that is not as wide as the header, or a number that is not finite.
 */
export function writeCsv(
  header: readonly string[],
  rows: readonly (readonly CsvValue[])[],
  options: { readonly byteOrderMark?: boolean } = {},
): string {
  const lines = [header, ...rows].map((row, i) => {
    if (row.length !== header.length)
      throw new RangeError(`row ${i} has ${row.length} cells, the header ${header.length}`);
    const line = row.map(written).join(",");
    return line === "" ? '""' : line;
  });
  return `${options.byteOrderMark === true ? "\uFEFF" : ""}${lines.join("\r\n")}\r\n`;
}

export interface CsvTable {
  readonly header: readonly string[];
  /** Every row as wide as the header, or wider where the file has more cells. */
  readonly rows: readonly (readonly string[])[];
  /** Line in the file on which each row begins, from 1. */
  readonly lines: readonly number[];
  readonly delimiter: "," | ";" | "\t";
  /** Whether the first line of the file was taken for column names; if not, they are "column 1", "column 2" … */
  readonly headerFound: boolean;
}

const DELIMITERS = ["\t", ";", ","] as const;
const DELIMITER_NAMES = { ",": "commas", ";": "semicolons", "\t": "tabs" } as const;
const LOOK_AT = 20;

/** The first records with something in them; none where the text can't be read with this delimiter. */
function beginning(text: string, delimiter: string): CsvRecord[] {
  try {
    return csvRecords(text, delimiter, LOOK_AT).records.filter((record) => !isEmpty(record));
  } catch (error) {
    if (error instanceof Problem) return [];
    throw error;
  }
}

/** The delimiter under which the first lines have most often as many cells as the very first; then the one with more cells. */
function findDelimiter(text: string): "," | ";" | "\t" {
  let best: { delimiter: "," | ";" | "\t"; agreement: number; width: number } = {
    delimiter: ",",
    agreement: 0,
    width: 1,
  };
  for (const delimiter of DELIMITERS) {
    const records = beginning(text, delimiter);
    const width = records[0]?.cells.length ?? 1;
    if (width < 2) continue;
    const agreement = records.filter((record) => record.cells.length === width).length / records.length;
    if (agreement > best.agreement || (agreement === best.agreement && width > best.width)) {
      best = { delimiter, agreement, width };
    }
  }
  return best.delimiter;
}

const isEmpty = (record: CsvRecord): boolean => record.cells.every((cell) => cell.trim() === "");

/** A first line with a plain number among its cells is hardly a line of names. */
const looksLikeData = (record: CsvRecord): boolean =>
  record.cells.some((cell) => /^[+-]?\d+(?:[.,]\d+)?$/.test(cell.trim()));

const shown = (lines: readonly number[]): string =>
  `${lines.length === 1 ? "line" : "lines"} ${lines.slice(0, 5).join(", ")}${lines.length > 5 ? ` and ${lines.length - 5} more` : ""}`;

/** `sep=;` in the first line tells a spreadsheet the delimiter. */
function takeSeparatorLine(text: string): { text: string; linesTaken: number; delimiter: "," | ";" | "\t" | null } {
  const found = /^sep=([,;\t])(?:\r\n|\n|\r)/i.exec(text);
  const delimiter = DELIMITERS.find((candidate) => candidate === found?.[1]) ?? null;
  if (found === null || delimiter === null) return { text, linesTaken: 0, delimiter: null };
  return { text: text.slice(found[0].length), linesTaken: 1, delimiter };
}

const tooManyRows = () =>
  new Problem("too-large", "This table has more than 200,000 rows. Split it and import the parts.");

function readRecords(text: string, delimiter: "," | ";" | "\t", notes: string[]): CsvRecord[] {
  const { records, oddQuotes, unwrapped } = csvRecords(text, delimiter, MOST_ROWS + 2);
  const filled = records.filter((record) => !isEmpty(record));
  if (records.length > MOST_ROWS + 1) throw tooManyRows();
  if (filled.length === 0)
    throw new Problem("table-unreadable", "This file holds no table: all of its lines are empty.");
  if (filled.length < records.length) notes.push(`Empty lines left out: ${records.length - filled.length}.`);
  if (unwrapped > 0) notes.push(`Cells written as ="…" were read as the text inside: ${unwrapped}.`);
  if (oddQuotes.length > 0) notes.push(`Text after a closing quote was kept: ${shown(oddQuotes)}.`);
  return filled;
}

const withoutEscape = (cell: string): string => (cell.startsWith("'") && FORMULA.test(cell) ? cell.slice(1) : cell);

/** Column names from the first record, or made up where that record is data. */
function readHeader(records: readonly CsvRecord[], headerIs: boolean | undefined, notes: string[]) {
  const [first, ...rest] = records;
  if (first === undefined) throw new RangeError("a table has at least one record");
  const headerFound = headerIs ?? !looksLikeData(first);
  if (!headerFound && headerIs === undefined) {
    notes.push("The first line holds a number and was taken for data: the columns have no names.");
  }
  const names = first.cells.map((cell) => withoutEscape(cell).trim());
  return {
    headerFound,
    header: headerFound ? names : names.map((_, i) => `column ${i + 1}`),
    body: headerFound ? rest : records,
  };
}

/**
 * Reads a table from a file's bytes. Delimiter (comma, semicolon, tab, or as `sep=` tells), encoding, decimal commas, cells
 * written as ="001" and a missing header are found out and told in the notes; where the delimiter is not a comma,
 * numbers with a decimal comma are given with a point.
 * @param options headerIs: whether the first line is a header, where a person has said so
 * @throws Problem `file-empty`, `table-unreadable` or `too-large` (200,000 rows, 10,000 characters a cell).
 */
export function readCsv(
  bytes: Uint8Array,
  options: { readonly headerIs?: boolean } = {},
): { value: CsvTable; notes: string[] } {
  const decoded = decodeText(bytes);
  const notes = [...decoded.notes];
  const { text, linesTaken, delimiter: told } = takeSeparatorLine(decoded.value);
  const delimiter = told ?? findDelimiter(text);
  const records = readRecords(text, delimiter, notes);
  if (delimiter !== ",") notes.push(`The cells are separated by ${DELIMITER_NAMES[delimiter]}.`);
  const { header, headerFound, body } = readHeader(records, options.headerIs, notes);
  if (body.length > MOST_ROWS) throw tooManyRows();
  const narrow = body.filter((record) => record.cells.length < header.length).map((record) => record.line + linesTaken);
  const wide = body.filter((record) => record.cells.length > header.length).map((record) => record.line + linesTaken);
  if (narrow.length > 0) notes.push(`Fewer cells than columns, the rest taken as empty: ${shown(narrow)}.`);
  if (wide.length > 0) {
    notes.push(`More cells than columns: ${shown(wide)}. If a cell holds the delimiter, it must stand in quotes.`);
  }
  const rows = body.map(({ cells }) => [
    ...cells.map(withoutEscape),
    ...Array<string>(Math.max(0, header.length - cells.length)).fill(""),
  ]);
  const converted = delimiter === "," ? { rows, notes: [] } : convertDecimalCommas(rows);
  return {
    value: {
      header,
      rows: converted.rows,
      lines: body.map((record) => record.line + linesTaken),
      delimiter,
      headerFound,
    },
    notes: [...notes, ...converted.notes],
  };
}
