import type { ReadRow } from "./judge-rows.ts";
import { readDateText, type DateOrder, type DateReading } from "./read-date-text.ts";
import {
  dayInWords,
  dayNumber,
  dayOrTime,
  isBefore,
  localText,
  zoneClock,
  type LocalTime,
  type ZoneClock,
} from "./zone-time.ts";

/** What the dates of a table are held against. */
export interface DateRules {
  /** IANA name; the dates are those of the people there. */
  readonly timeZone: string;
  /** The time of reading: nothing was counted after it. */
  readonly now: string;
  /** "2031-05-01", or null where the season has no such day. */
  readonly seasonStartsOn: string | null;
  readonly seasonEndsOn: string | null;
  /** What a person has said of dates that can be read two ways. */
  readonly order?: DateOrder | undefined;
}

/** Asked once a file: nothing of the rows concerned is written until it is answered. */
export interface DateOrderQuestion {
  readonly kind: "date-order";
  readonly why: string;
  readonly written: string;
  readonly rows: number;
  /** The days that `written` would be. */
  readonly dayFirst: string;
  readonly monthFirst: string;
}

export interface DatedRow {
  /** The moment of the count; null where the row tells none. */
  readonly madeAt: string | null;
  /** As it was read, on the clocks of the place: "2031-05-03". */
  readonly day: string;
  /** What could not be read and stays in the note. */
  readonly kept: string;
}

export interface DatedRows {
  readonly rows: readonly ReadRow[];
  readonly dates: ReadonlyMap<number, DatedRow>;
  /** What to look at although the row is good, by row. */
  readonly flags: ReadonlyMap<number, readonly string[]>;
  /** The order by which dates were read; null where none needed it. */
  readonly order: DateOrder | null;
  readonly question: DateOrderQuestion | null;
  readonly notes: readonly string[];
}

const ORDER_WORDS = { "day-first": "day first", "month-first": "month first" } as const;
const UNDATED: DatedRow = { madeAt: null, day: "", kept: "" };

type Ordered = Extract<DateReading, { kind: "ordered" }>;
interface OrderedRow {
  readonly row: ReadRow;
  readonly reading: Ordered;
}

/** The order of the column: as a person said, or as its dates show that have a part above 12; "asked" where neither does. */
function settleOrder(
  ordered: readonly OrderedRow[],
  said: DateOrder | undefined,
): { readonly order: DateOrder | "asked" | null; readonly note: string; readonly why: string } {
  const silent = { note: "", why: "" };
  if (ordered.length === 0) return { order: null, ...silent };
  if (said !== undefined) return { order: said, ...silent };
  const dayOnly = ordered.find(({ reading }) => reading.monthFirst === null);
  const monthOnly = ordered.find(({ reading }) => reading.dayFirst === null);
  if (dayOnly !== undefined && monthOnly !== undefined) {
    const why = `Row ${dayOnly.row.row} has ${dayOnly.row.date}, which can only have the day first, and row ${monthOnly.row.row} has ${monthOnly.row.date}, which can only have the month first.`;
    return { order: "asked", note: "", why };
  }
  const shows = dayOnly ?? monthOnly;
  if (shows === undefined)
    return { order: "asked", note: "", why: "No date in this file shows it: no part is above 12." };
  const order = dayOnly === undefined ? "month-first" : "day-first";
  const note = `Dates are read with the ${ORDER_WORDS[order]}: row ${shows.row.row} has ${shows.row.date}.`;
  return { order, note, why: "" };
}

function questionOf(ordered: readonly OrderedRow[], why: string, open: ReadonlySet<number>): DateOrderQuestion | null {
  const asked = ordered.filter(({ row }) => open.has(row.row));
  const both = asked.find(({ reading }) => reading.dayFirst !== null && reading.monthFirst !== null) ?? asked[0];
  if (both === undefined) return null;
  const words = (day: LocalTime | null) => (day === null ? "no day" : dayInWords(day));
  const { dayFirst, monthFirst } = both.reading;
  const days = { dayFirst: words(dayFirst), monthFirst: words(monthFirst) };
  return { kind: "date-order", why, written: both.row.date, rows: asked.length, ...days };
}

/** A row held up by its date. */
function heldUp(row: ReadRow, verdict: "question" | "refused", kind: ReadRow["kind"], message: string): ReadRow {
  return { ...row, verdict, kind, message };
}

/** One row's date by the order that holds: the day or moment that it tells, or the row held up. */
function readRow(
  row: ReadRow,
  reading: DateReading,
  order: DateOrder | "asked" | null,
): ReadRow | { readonly local: LocalTime } | { readonly moment: string } | "none" | "unreadable" {
  switch (reading.kind) {
    case "empty":
      return "none";
    case "no-date":
      return "unreadable";
    case "no-day":
      return heldUp(row, "refused", "date-impossible", `There is no day “${row.date}”. Look at the sheet.`);
    case "moment":
      return { moment: reading.at };
    case "local":
      return { local: reading.local };
    case "ordered": {
      if (order === "asked" || order === null) {
        return heldUp(row, "question", "date-order", `Does “${row.date}” have the day or the month first?`);
      }
      const local = order === "day-first" ? reading.dayFirst : reading.monthFirst;
      if (local !== null) return { local };
      const message = `“${row.date}” is no day with the ${ORDER_WORDS[order]}. Look at the sheet.`;
      return heldUp(row, "refused", "date-impossible", message);
    }
  }
}

const dayOfText = (day: string): number => Date.parse(`${day}T00:00:00Z`) / 86_400_000;

function flagsOf(local: LocalTime, moment: string, row: ReadRow, rules: DateRules, clock: ZoneClock): string[] {
  const flags: string[] = [];
  const { seasonStartsOn: first, seasonEndsOn: last } = rules;
  const day = dayNumber(local);
  if (first !== null && day < dayOfText(first)) flags.push(`Before the season, which begins on ${first}.`);
  if (last !== null && day > dayOfText(last)) flags.push(`After the season, which ended on ${last}.`);
  const opened = row.found?.openedAt;
  if (opened !== undefined && isBefore(moment, opened, clock)) {
    const since = dayInWords(clock.localOf(opened));
    flags.push(`Dated ${dayInWords(local)}, before the cell was drawn or opened (${since}). The record says so.`);
  }
  return flags;
}

/**
 * The dates of the rows that would be written. The order of day and month is taken from the whole column where it shows it,
 * and asked once otherwise. A day to come is refused; one outside the season or before the cell was drawn is flagged. A date
 * without a time is the first moment of its day in the survey's time zone; one with a time is that time there.
 */
export function judgeDates(rows: readonly ReadRow[], rules: DateRules): DatedRows {
  const clock = zoneClock(rules.timeZone);
  const readings = rows.map((row) => readDateText(row.date));
  const ordered = rows.flatMap((row, i): OrderedRow[] => {
    const reading = readings[i];
    return reading?.kind === "ordered" ? [{ row, reading }] : [];
  });
  const { order, note, why } = settleOrder(ordered, rules.order);
  const dates = new Map<number, DatedRow>();
  const flags = new Map<number, string[]>();
  const open = new Set<number>();
  let serials = 0;
  const judged = rows.map((row, i): ReadRow => {
    const reading = readings[i];
    // A word that may be a zero is asked about: the order of its row's date with it, not in a second round.
    if (row.kind === "zero-word" && reading?.kind === "ordered" && order === "asked") open.add(row.row);
    if (row.verdict !== "new" || reading === undefined) return row;
    const read = readRow(row, reading, order);
    if (typeof read === "object" && "verdict" in read) {
      if (read.verdict === "question") open.add(row.row);
      return read;
    }
    if (read === "none") return row;
    if (read === "unreadable") {
      dates.set(row.row, { ...UNDATED, kept: row.date });
      flags.set(row.row, [`“${row.date}” is no date: it stays in the note, and the count is dated now.`]);
      return row;
    }
    const moment = "moment" in read ? read.moment : clock.momentOf(read.local);
    const local = "moment" in read ? dayOrTime(moment, clock) : read.local;
    if (Date.parse(moment) > Date.parse(rules.now)) {
      const message = `${dayInWords(local)} has not come yet (“${row.date}”). Look at the sheet.`;
      return heldUp(row, "refused", "date-future", message);
    }
    if (reading.kind === "local" && reading.serial) serials += 1;
    dates.set(row.row, { madeAt: moment, day: localText(local), kept: "" });
    flags.set(row.row, flagsOf(local, moment, row, rules, clock));
    return row;
  });
  return {
    rows: judged,
    dates,
    flags,
    order: order === "asked" ? null : order,
    question: questionOf(ordered, why, open),
    notes: [note, serialNote(serials)].filter((text) => text !== ""),
  };
}

function serialNote(rows: number): string {
  if (rows === 0) return "";
  return `Dates written as a spreadsheet's day numbers were read in ${rows === 1 ? "one row" : `${rows} rows`}: day 1 is 1 January 1900.`;
}
