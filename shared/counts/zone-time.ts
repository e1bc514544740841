import { MONTHS } from "#shared/units/months.ts";

/** A day of the calendar, and where it is known the time on the clocks of the place. */
export interface LocalTime {
  readonly year: number;
  /** 1–12. */
  readonly month: number;
  readonly day: number;
  readonly time: { readonly hour: number; readonly minute: number; readonly second: number } | null;
}

/** Turns the clocks of one place into moments (ISO 8601, UTC) and back. */
export interface ZoneClock {
  /** A time that the clocks show twice is the first of the two; one that they leap over is moved on by the leap. */
  momentOf(local: LocalTime): string;
  localOf(moment: string): LocalTime & { readonly time: object };
}

const DAY_MS = 86_400_000;
const MIDNIGHT = { hour: 0, minute: 0, second: 0 } as const;
const FIELDS = {
  calendar: "iso8601",
  numberingSystem: "latn",
  hourCycle: "h23",
  year: "numeric",
  month: "2-digit",
  day: "2-digit",
  hour: "2-digit",
  minute: "2-digit",
  second: "2-digit",
} as const;

function formatterFor(timeZone: string): Intl.DateTimeFormat {
  try {
    return new Intl.DateTimeFormat("en", { ...FIELDS, timeZone });
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return new Intl.DateTimeFormat("en", { ...FIELDS, timeZone: "UTC" });
  }
}

/**
 * The clocks of an IANA time zone; those of UTC where the runtime does not know the zone.
 *
 * A date without a time stands for its whole day and is kept as the day's first moment there, mostly 00:00. So 3 May 2031 in
 * Europe/Berlin (UTC+2) is 2031-05-02T22:00:00.000Z.
 */
export function zoneClock(timeZone: string): ZoneClock {
  const formatter = formatterFor(timeZone);
  const localOf = (moment: string): LocalTime & { time: NonNullable<LocalTime["time"]> } => {
    const parts = new Map(formatter.formatToParts(new Date(moment)).map(({ type, value }) => [type, Number(value)]));
    const part = (type: Intl.DateTimeFormatPartTypes): number => parts.get(type) ?? 0;
    const time = { hour: part("hour"), minute: part("minute"), second: part("second") };
    return { year: part("year"), month: part("month"), day: part("day"), time };
  };
  /** How far the clocks are ahead of UTC at a moment, in milliseconds. */
  const ahead = (at: number): number => asIfUtc(localOf(new Date(at).toISOString())) - Math.floor(at / 1000) * 1000;
  return {
    localOf,
    momentOf(local) {
      const shown = asIfUtc(local);
      const [before, after] = [ahead(shown - DAY_MS), ahead(shown + DAY_MS)];
      const fits = [before, after].map((offset) => shown - offset).filter((at) => at + ahead(at) === shown);
      return new Date(fits.length === 0 ? shown - before : Math.min(...fits)).toISOString();
    },
  };
}

function asIfUtc({ year, month, day, time }: LocalTime): number {
  const { hour, minute, second } = time ?? MIDNIGHT;
  return Date.UTC(year, month - 1, day, hour, minute, second);
}

/** Whether there is such a day in the calendar (years 1900 to 2199) and such a time in a day. */
export function isLocalTime({ year, month, day, time }: LocalTime): boolean {
  if (year < 1900 || year > 2199 || month < 1 || month > 12 || day < 1) return false;
  if (new Date(Date.UTC(year, month - 1, day)).getUTCDate() !== day) return false;
  return time === null || (time.hour < 24 && time.minute < 60 && time.second < 60);
}

/** The moment's own time on the clocks there, or none where it is a day's first moment and so stands for the day. */
export function dayOrTime(moment: string, clock: ZoneClock): LocalTime {
  const local = clock.localOf(moment);
  const isWholeDay = clock.momentOf({ ...local, time: null }) === new Date(moment).toISOString();
  return isWholeDay ? { ...local, time: null } : local;
}

/**
 * Whether something dated `moment` came before `since`, without doubt: a moment that stands for a whole day only where that
 * day was over by then.
 */
export function isBefore(moment: string, since: string, clock: ZoneClock): boolean {
  if (Date.parse(moment) >= Date.parse(since)) return false;
  if (dayOrTime(moment, clock).time !== null) return true;
  return dayNumber(clock.localOf(moment)) < dayNumber(clock.localOf(since));
}

/** Days since 1970-01-01, for comparing days. */
export function dayNumber({ year, month, day }: LocalTime): number {
  return Date.UTC(year, month - 1, day) / DAY_MS;
}

const two = (value: number): string => String(value).padStart(2, "0");

/** "2031-05-03", or "2031-05-03 14:30" where the time is known. */
export function localText({ year, month, day, time }: LocalTime): string {
  const date = `${String(year).padStart(4, "0")}-${two(month)}-${two(day)}`;
  return time === null ? date : `${date} ${two(time.hour)}:${two(time.minute)}`;
}

/** "3 May 2031". */
export function dayInWords({ year, month, day }: LocalTime): string {
  return `${day} ${MONTHS[month - 1] ?? ""} ${year}`;
}

/** The month (1–12) whose English name a word begins, with three letters at least; 0 where none does. */
export function monthNamed(word: string): number {
  const lower = word.toLowerCase().replace(/^sept$/, "sep");
  if (lower.length < 3) return 0;
  return MONTHS.findIndex((name) => name.toLowerCase().startsWith(lower)) + 1;
}
