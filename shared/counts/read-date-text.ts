import { westernDigits } from "./digits.ts";
import { isLocalTime, monthNamed, type LocalTime } from "./zone-time.ts";

/** Which of two numbers comes first in dates such as 03/04/2031. */
export type DateOrder = "day-first" | "month-first";

export type DateReading =
  | { readonly kind: "empty" }
  /** One day, however the table orders its dates. `serial`: a spreadsheet's day number. */
  | { readonly kind: "local"; readonly local: LocalTime; readonly serial: boolean }
  /** A moment with its own offset from UTC. */
  | { readonly kind: "moment"; readonly at: string }
  /** Two numbers and a year: a day in one order, or another day in the other; null where an order gives no day. */
  | { readonly kind: "ordered"; readonly dayFirst: LocalTime | null; readonly monthFirst: LocalTime | null }
  /** Written like a date, and there is no such day: 31 February. */
  | { readonly kind: "no-day" }
  | { readonly kind: "no-date" };

const LONGEST = 60;
const NO_DATE: DateReading = { kind: "no-date" };
const NO_DAY: DateReading = { kind: "no-day" };

const WITH_TIME =
  /^(.+?)(?:t|,? +|, *)(\d{1,2}):(\d{2})(?::(\d{2})(?:[.,]\d+)?)? ?(am|pm|a\.m\.|p\.m\.)? ?(z|utc|[+-]\d{2}:?\d{2})?$/;
const YEAR_FIRST = /^(\d{4})([-/.])(\d{1,2})\2(\d{1,2})$/;
const COMPACT = /^(\d{4})(\d{2})(\d{2})$/;
const NUMBERS = /^(\d{1,2})([-/.]) ?(\d{1,2})\2 ?(\d{4}|\d{2})\.?$/;
const DAY_NAME = /^(\d{1,2})(?:st|nd|rd|th)?[-/., ]*([a-z]{3,9})[-/., ]*(\d{4}|\d{2})$/;
const NAME_DAY = /^([a-z]{3,9})[-/., ]*(\d{1,2})(?:st|nd|rd|th)?[-/., ]+(\d{4}|\d{2})$/;
const SERIAL = /^(\d{5})(?:\.(\d+))?$/;
/** Day numbers of spreadsheets from 1950 to 2100; day 25 569 is 1 January 1970. */
const FIRST_SERIAL = 18_264;
const LAST_SERIAL = 73_415;
const SERIAL_OF_1970 = 25_569;
const DAY_SECONDS = 86_400;

type Time = LocalTime["time"];
type Day = Omit<LocalTime, "time">;

/** Two figures are years of this century: 98 is 2098, which is refused as a day to come rather than guessed at. */
const fullYear = (year: string): number => (year.length === 2 ? 2000 + Number(year) : Number(year));

function readTime(hour: string, minute: string, second: string | undefined, half: string | undefined): Time | "none" {
  const given = Number(hour);
  if (half !== undefined && (given < 1 || given > 12)) return "none";
  const at = half === undefined ? given : (given % 12) + (half.startsWith("p") ? 12 : 0);
  return { hour: at, minute: Number(minute), second: Number(second ?? "0") };
}

function serialDay(text: string): LocalTime | null {
  const found = SERIAL.exec(text);
  const days = Number(found?.[1]);
  if (found === null || days < FIRST_SERIAL || days > LAST_SERIAL) return null;
  const seconds = Math.round(Number(`0.${found[2] ?? "0"}`) * DAY_SECONDS);
  const at = new Date(((days - SERIAL_OF_1970) * DAY_SECONDS + seconds) * 1000);
  const time = { hour: at.getUTCHours(), minute: at.getUTCMinutes(), second: at.getUTCSeconds() };
  const day = { year: at.getUTCFullYear(), month: at.getUTCMonth() + 1, day: at.getUTCDate() };
  return { ...day, time: seconds === 0 ? null : time };
}

/** The days that a text may mean without its time; "no-date" where it has not the form of a date. */
function readDay(text: string): { readonly one: Day } | { readonly first: Day; readonly second: Day } | "no-date" {
  const yearFirst = YEAR_FIRST.exec(text) ?? COMPACT.exec(text);
  if (yearFirst !== null) {
    const [month, day] = yearFirst.slice(-2);
    return { one: { year: Number(yearFirst[1]), month: Number(month), day: Number(day) } };
  }
  const numbers = NUMBERS.exec(text);
  if (numbers !== null) {
    const [a, b, year] = [Number(numbers[1]), Number(numbers[3]), fullYear(numbers[4] ?? "")];
    const first = { year, month: b, day: a };
    // Dots part days from months wherever they are used.
    return numbers[2] === "." ? { one: first } : { first, second: { year, month: a, day: b } };
  }
  const named = DAY_NAME.exec(text);
  const [day, name, year] =
    named !== null ? named.slice(1) : ((found) => [found?.[2], found?.[1], found?.[3]])(NAME_DAY.exec(text));
  const month = monthNamed(name ?? "");
  return month === 0 || day === undefined || year === undefined
    ? "no-date"
    : { one: { year: fullYear(year), month, day: Number(day) } };
}

function momentOf({ year, month, day, time }: LocalTime, offset: string): string {
  const { hour, minute, second } = time ?? { hour: 0, minute: 0, second: 0 };
  const [, sign, hours, minutes] = /^([+-])(\d{2}):?(\d{2})$/.exec(offset) ?? [];
  const ahead = sign === undefined ? 0 : (sign === "-" ? -1 : 1) * (Number(hours) * 60 + Number(minutes));
  return new Date(Date.UTC(year, month - 1, day, hour, minute - ahead, second)).toISOString();
}

/**
 * What a text says about a day: ISO 8601 (2031-05-03, 20310503), day and month in either order with a year (03/04/2031,
 * 3-4-31), with dots always the day first (3.4.2031), with an English month's name (3 May 2031, May 3, 2031), or the day number
 * of a spreadsheet (day 1 is 1 January 1900); each with a time or without. A day without a year is no date.
 */
export function readDateText(given: string): DateReading {
  const text = westernDigits(given.normalize("NFC"))
    .replaceAll(/[\s\u00a0\u202f]+/g, " ")
    .trim()
    .toLowerCase();
  if (text === "") return { kind: "empty" };
  if (text.length > LONGEST) return NO_DATE;
  const serial = serialDay(text);
  if (serial !== null) return { kind: "local", local: serial, serial: true };
  const withTime = WITH_TIME.exec(text);
  const days = readDay(withTime?.[1]?.trim() ?? text);
  if (days === "no-date") return NO_DATE;
  const time = withTime === null ? null : readTime(withTime[2] ?? "", withTime[3] ?? "", withTime[4], withTime[5]);
  if (time === "none") return NO_DAY;
  const valid = (day: Day): LocalTime | null => (isLocalTime({ ...day, time }) ? { ...day, time } : null);
  const offset = withTime?.[6];
  if ("one" in days) {
    const local = valid(days.one);
    if (local === null) return NO_DAY;
    return offset === undefined
      ? { kind: "local", local, serial: false }
      : { kind: "moment", at: momentOf(local, offset) };
  }
  if (offset !== undefined) return NO_DATE;
  const [dayFirst, monthFirst] = [valid(days.first), valid(days.second)];
  if (dayFirst === null && monthFirst === null) return NO_DAY;
  if (dayFirst !== null && monthFirst !== null && dayFirst.day === monthFirst.day) {
    return { kind: "local", local: dayFirst, serial: false };
  }
  return { kind: "ordered", dayFirst, monthFirst };
}
