import { Problem } from "#shared/problem.ts";

export const MOST_ROWS = 200_000;
export const MOST_CELL_CHARACTERS = 10_000;
const MOST_COLUMNS = 1_000;

export interface CsvRecord {
  readonly cells: string[];
  /** Number of the line in the file on which it begins, from 1. */
  readonly line: number;
}

export interface CsvRecords {
  readonly records: CsvRecord[];
  /** Lines on which text follows a closing quote. */
  readonly oddQuotes: number[];
  /** Cells of the form ="001", by which spreadsheets are kept from reading text as a number. */
  readonly unwrapped: number;
}

/**
 * Reads delimited text (RFC 4180, with LF, CR LF or CR between lines). It is a scanner of our own: the browser build of
 * the usual package brings 120 kB of Node stand-ins and Node's types, reads neither `="a,b"` nor the line numbers wanted
 * for messages, and this is one page of code.
 */
class Scanner {
  readonly records: CsvRecord[] = [];
  readonly oddQuotes: number[] = [];
  unwrapped = 0;
  private at = 0;
  private line = 1;
  private readonly text: string;
  private readonly delimiter: string;
  private readonly mostRecords: number;

  constructor(text: string, delimiter: string, mostRecords: number) {
    this.text = text;
    this.delimiter = delimiter;
    this.mostRecords = mostRecords;
  }

  run(): this {
    while (this.at < this.text.length && this.records.length < this.mostRecords) this.record();
    return this;
  }

  private record(): void {
    const line = this.line;
    const cells: string[] = [];
    for (;;) {
      const cell = this.cell();
      if (cell.length > MOST_CELL_CHARACTERS) {
        throw new Problem(
          "table-unreadable",
          `A cell in line ${line} has ${cell.length} characters; at most 10,000 are read.`,
        );
      }
      cells.push(cell);
      if (cells.length > MOST_COLUMNS) {
        throw new Problem(
          "table-unreadable",
          `Line ${line} has more than 1,000 cells. Export the columns that are needed.`,
        );
      }
      if (this.text[this.at] !== this.delimiter) break;
      this.at += 1;
    }
    this.lineEnd();
    this.records.push({ cells, line });
  }

  private cell(): string {
    if (this.text[this.at] === '"') return this.unwrap(this.quoted());
    if (this.text.startsWith('="', this.at)) {
      this.at += 1;
      this.unwrapped += 1;
      return this.quoted();
    }
    return this.plain();
  }

  /** A quoted cell that reads ="001" is the same wrapping, written by a program that quotes what it writes. */
  private unwrap(cell: string): string {
    const inner = /^="((?:[^"]|"")*)"$/s.exec(cell)?.[1];
    if (inner === undefined) return cell;
    this.unwrapped += 1;
    return inner.replaceAll('""', '"');
  }

  private plain(): string {
    const start = this.at;
    while (this.at < this.text.length) {
      const character = this.text[this.at];
      if (character === this.delimiter || character === "\n" || character === "\r") break;
      this.at += 1;
    }
    return this.text.slice(start, this.at);
  }

  private quoted(): string {
    const opened = this.line;
    let cell = "";
    for (;;) {
      const end = this.text.indexOf('"', this.at + 1);
      if (end === -1) {
        throw new Problem(
          "table-unreadable",
          `The quote that opens in line ${opened} is never closed. Close it and try again.`,
        );
      }
      const piece = this.text.slice(this.at + 1, end);
      this.line += piece.match(/\r\n|\n|\r/g)?.length ?? 0;
      cell += piece;
      this.at = end + 1;
      if (this.text[this.at] !== '"') break;
      cell += '"';
    }
    const rest = this.plain();
    if (rest.trim() !== "") this.oddQuotes.push(this.line);
    return rest.trim() === "" ? cell : cell + rest;
  }

  private lineEnd(): void {
    if (this.text[this.at] === "\r") this.at += 1;
    if (this.text[this.at] === "\n") this.at += 1;
    this.line += 1;
  }
}

/**
 * The records of delimited text.
 * @param mostRecords stop after so many (to look at the beginning of a file)
 * @throws Problem `table-unreadable` for an open quote, a cell above 10,000 characters or a line above 1,000 cells.
 */
export function csvRecords(text: string, delimiter: string, mostRecords = Infinity): CsvRecords {
  return new Scanner(text, delimiter, mostRecords).run();
}
