import { createContext, use, useMemo } from "react";
import { timesIn, type Times } from "./format.ts";

/** The IANA time zone of what the page is about; UTC where it is about no one place. */
export const TimeZoneContext = createContext("UTC");

/** Times on the clock of the page's time zone. */
export function useTimes(): Times {
  const timeZone = use(TimeZoneContext);
  return useMemo(() => timesIn(timeZone), [timeZone]);
}
