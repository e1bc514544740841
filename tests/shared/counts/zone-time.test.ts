import { describe, expect, test } from "vitest";
import { dayOrTime, isBefore, localText, type LocalTime, zoneClock } from "#shared/counts/zone-time.ts";

const at = (year: number, month: number, day: number, hour?: number, minute = 0): LocalTime => ({
  year,
  month,
  day,
  time: hour === undefined ? null : { hour, minute, second: 0 },
});

describe("the clocks of a place", () => {
  // Each value is that of Python's zoneinfo (IANA data): datetime(…, tzinfo=ZoneInfo(zone)).astimezone(timezone.utc), whose
  // fold=0 takes the first of two and moves on over a gap. Santiago leaps from 24:00 to 01:00 on 6 September 2026.
  test.each([
    ["Europe/Berlin", at(2031, 5, 3), "2031-05-02T22:00:00.000Z"],
    ["Europe/Berlin", at(2031, 1, 3), "2031-01-02T23:00:00.000Z"],
    ["America/St_Johns", at(2026, 7, 1, 9, 15), "2026-07-01T11:45:00.000Z"],
    ["Asia/Kathmandu", at(2026, 5, 3), "2026-05-02T18:15:00.000Z"],
    ["Pacific/Apia", at(2026, 5, 3), "2026-05-02T11:00:00.000Z"],
    ["Europe/Berlin", at(2026, 10, 25, 2, 30), "2026-10-25T00:30:00.000Z"],
    ["Europe/Berlin", at(2026, 3, 29, 2, 30), "2026-03-29T01:30:00.000Z"],
    ["America/Santiago", at(2026, 9, 6), "2026-09-06T04:00:00.000Z"],
    ["America/Sao_Paulo", at(2018, 11, 4), "2018-11-04T03:00:00.000Z"],
  ])("%s, %o is %s", (zone, local, moment) => {
    expect(zoneClock(zone).momentOf(local)).toBe(moment);
  });

  test("a zone that is not known has the clocks of UTC", () => {
    expect(zoneClock("Nowhere/At_All").momentOf(at(2031, 5, 3, 7))).toBe("2031-05-03T07:00:00.000Z");
  });

  // In Santiago 6 September 2026 began at 01:00.
  test("a day's first moment stands for the day, and any other for its time", () => {
    const told = (zone: string, moment: string) => localText(dayOrTime(moment, zoneClock(zone)));
    expect(told("Europe/Berlin", "2031-05-02T22:00:00Z")).toBe("2031-05-03");
    expect(told("Europe/Berlin", "2031-05-02T22:01:00Z")).toBe("2031-05-03 00:01");
    expect(told("UTC", "2031-05-02T22:00:00Z")).toBe("2031-05-02 22:00");
    expect(told("America/Santiago", "2026-09-06T04:00:00Z")).toBe("2026-09-06");
  });
});

// Drawn on 2 May 2031 at 08:00 UTC, which is 10:00 in Berlin; midnight there is 22:00 UTC of the day before.
test("a day is before a moment once it was over by then; a time is as soon as it is earlier", () => {
  const clock = zoneClock("Europe/Berlin");
  const drawn = "2031-05-02T08:00:00Z";
  expect(isBefore("2031-05-01T22:00:00Z", drawn, clock)).toBe(false);
  expect(isBefore("2031-04-30T22:00:00Z", drawn, clock)).toBe(true);
  expect(isBefore("2031-05-02T07:59:00Z", drawn, clock)).toBe(true);
  expect(isBefore("2031-05-02T08:00:00Z", drawn, clock)).toBe(false);
  expect(isBefore("2031-05-02T22:00:00Z", drawn, clock)).toBe(false);
});
