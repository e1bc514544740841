import { keyFingerprint, publicKeyOf } from "#shared/record/sign.ts";
import type { Context } from "../context.ts";
import { type Elsewhere, elsewhereOf } from "../db/elsewhere.ts";
import { type EventRow, eventsBefore, newestEvent } from "../db/events.ts";
import { memberNames } from "../db/members.ts";

const EVENTS_A_PAGE = 100;

export interface EventsView {
  readonly events: readonly EventRow[];
  readonly newest: EventRow;
  readonly keyFingerprint: string;
  readonly elsewhere: Elsewhere;
  readonly more: boolean;
  readonly names: ReadonlyMap<string, string>;
}

/** A page of the record, newest first, before a sequence where one is given. */
export function listEvents(ctx: Context, before: number | null): EventsView {
  const newest = newestEvent(ctx.db, ctx.surveyId);
  if (!newest) throw new Error(`survey ${ctx.surveyId} has no event`);
  const rows = eventsBefore(ctx.db, ctx.surveyId, before, EVENTS_A_PAGE + 1);
  return {
    events: rows.slice(0, EVENTS_A_PAGE),
    newest,
    keyFingerprint: keyFingerprint(publicKeyOf(ctx.signingKey)),
    elsewhere: elsewhereOf(ctx.db, ctx.surveyId),
    more: rows.length > EVENTS_A_PAGE,
    names: memberNames(ctx.db, ctx.surveyId),
  };
}
