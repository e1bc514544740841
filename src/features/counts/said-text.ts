import { STATE_WORDS } from "#shared/counts/count.ts";
import { formatAsIs, type Times } from "../../components/ui/format.ts";
import type { Said } from "./queries.ts";

/** "7 burrows", "refused". */
export function saidText(said: Said, plural: string): string {
  return said.state === "counted" ? `${formatAsIs(said.value)} ${plural}` : STATE_WORDS[said.state];
}

/** When it was counted. A day without a time is kept as its first moment, and shown as the day. */
export function madeText(times: Times, at: string): string {
  return times.timeOfDay(at) === "00:00" ? times.day(at) : times.time(at);
}
