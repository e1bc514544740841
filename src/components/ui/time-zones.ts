/** All IANA time zones that this browser knows, with its own and UTC among them. */
export function timeZones(own: string): string[] {
  const known = typeof Intl.supportedValuesOf === "function" ? Intl.supportedValuesOf("timeZone") : [];
  return [...new Set([own, "UTC", ...known])].sort();
}

export function ownTimeZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone || "UTC";
}
