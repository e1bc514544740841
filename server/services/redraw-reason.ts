import type { Reader } from "../db/open.ts";
import { seedsSince } from "../db/draws.ts";
import { hasEvent } from "../db/events.ts";

/** Why a further draw has to say why it is made. */
export type RedrawReason = "waypoints-exported" | "third-draw-in-a-day";

const DAY_IN_MILLISECONDS = 86_400_000;
const DRAWS_A_DAY = 2;

/**
 * Whether a new declaration needs a reason: once cells of an earlier draw went to the field (rule R7), and from the third
 * seed of a survey within 24 hours on, whichever frame versions they were for and whether or not they became draws.
 */
export function redrawReason(reader: Reader, surveyId: string, now: Date): RedrawReason | null {
  if (hasEvent(reader, surveyId, ["waypoints-exported"])) return "waypoints-exported";
  const dayAgo = new Date(now.getTime() - DAY_IN_MILLISECONDS).toISOString();
  return seedsSince(reader, surveyId, dayAgo) >= DRAWS_A_DAY ? "third-draw-in-a-day" : null;
}
