import type { EventKind } from "#shared/record/events.ts";
import { type Act, appendEvent, type EventRow, hasEvent } from "../db/events.ts";
import type { Tx } from "../db/open.ts";
import { expectInWork } from "../db/surveys.ts";
import { type Happening, tellAuditors, type Telling } from "./tell-auditors.ts";

/** What an archived survey's record still takes: that it was archived, and the name of somebody in it. */
const WHEN_ARCHIVED: ReadonlySet<EventKind> = new Set(["survey-archived", "member-renamed"]);

/**
 * Appends an event to the survey's record and, in the same transaction, queues the mails of rule R8 to its auditors where it
 * is one that they are told of. Every service writes to the record by this.
 * @throws Problem `survey-archived`, also where it was archived while the act was being prepared
 */
export function recordEvent<K extends EventKind>(tx: Tx, platform: Telling, act: Act<K>): EventRow {
  if (!WHEN_ARCHIVED.has(act.kind)) expectInWork(tx, act.surveyId);
  const inBrief = witnessed(tx, act);
  const event = appendEvent(tx, platform, act);
  if (inBrief !== null) tellAuditors(tx, platform, event, happening(inBrief, act.at), null);
  return event;
}

/** In a few words what auditors are told; null for what they are not told of. To be asked before the event is there. */
function witnessed(tx: Tx, { surveyId, kind }: Pick<Act<EventKind>, "surveyId" | "kind">): string | null {
  if (kind === "frame-sealed") return "a frame was sealed";
  if (kind === "draw-declared") return "a draw was declared";
  if (kind === "draw-made") return "cells were drawn";
  if (kind === "draw-withdrawn") return "a draw was withdrawn";
  if (kind === "estimate-kept") return "an estimate was put on record";
  if (kind === "count-entered" && !hasEvent(tx, surveyId, ["count-entered"])) return "the first count was entered";
  return null;
}

function happening(inBrief: string, at: string): Happening {
  return { inBrief, happened: `${inBrief} at ${at.slice(0, 10)} ${at.slice(11, 16)} UTC` };
}
