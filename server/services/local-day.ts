/** Whether this runtime knows a time zone by that name. */
export function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat("en-GB", { timeZone: name });
    return true;
  } catch {
    return false;
  }
}

/** The day of a time (ISO 8601, UTC) for the people there, "2031-06-03"; in UTC where the zone is not known. */
export function localDay(at: string, timeZone: string): string {
  const zone = isTimeZone(timeZone) ? timeZone : "UTC";
  const whole = { year: "numeric", month: "2-digit", day: "2-digit" } as const;
  const parts = new Intl.DateTimeFormat("en-GB", { ...whole, timeZone: zone }).formatToParts(new Date(at));
  const part = (type: "year" | "month" | "day"): string => parts.find((one) => one.type === type)?.value ?? "";
  return `${part("year").padStart(4, "0")}-${part("month")}-${part("day")}`;
}
