import { and, desc, eq, gte, inArray, lt } from "drizzle-orm";
import { BEFORE_THE_FIRST, canonicalText, type Envelope, envelopeSha256, payloadSha256 } from "#shared/record/chain.ts";
import { EVENT_PAYLOADS, type EventKind, type EventPayload } from "#shared/record/events.ts";
import { signHash } from "#shared/record/sign.ts";
import type { Reader, Tx } from "./open.ts";
import { events } from "./schema/record.ts";

export type EventRow = typeof events.$inferSelect;

/** What somebody did, before it is hashed. */
export interface Act<K extends EventKind> {
  readonly surveyId: string;
  readonly at: string;
  readonly memberId: string;
  readonly kind: K;
  readonly payload: EventPayload<K>;
}

/** What signing and salting take from the platform. */
interface Sealing {
  readonly signingKey: string;
  readonly random: (bytes: number) => Uint8Array;
}

/** Appends one event to the chain of its survey: hashed, linked and signed, in the caller's write transaction. */
export function appendEvent<K extends EventKind>(tx: Tx, sealing: Sealing, act: Act<K>): EventRow {
  const payload = EVENT_PAYLOADS[act.kind].parse(act.payload);
  const last = newestEvent(tx, act.surveyId);
  const salt = Buffer.from(sealing.random(16)).toString("hex");
  const envelope: Envelope = {
    format: "quillet-event/1",
    survey: act.surveyId,
    sequence: (last?.sequence ?? 0) + 1,
    at: act.at,
    member: act.memberId,
    kind: act.kind,
    previous: last?.sha256 ?? BEFORE_THE_FIRST,
    payloadSha256: payloadSha256(salt, payload),
  };
  const sha256 = envelopeSha256(envelope);
  const row: EventRow = {
    surveyId: act.surveyId,
    sequence: envelope.sequence,
    at: act.at,
    memberId: act.memberId,
    kind: act.kind,
    previousSha256: envelope.previous,
    salt,
    payload: canonicalText(payload),
    payloadSha256: envelope.payloadSha256,
    sha256,
    signature: signHash(sha256, sealing.signingKey),
  };
  tx.insert(events).values(row).run();
  return row;
}

export function newestEvent(reader: Reader, surveyId: string): EventRow | undefined {
  return reader
    .select()
    .from(events)
    .where(eq(events.surveyId, surveyId))
    .orderBy(desc(events.sequence))
    .limit(1)
    .get();
}

/** Newest first, at most `limit`, before a sequence where one is given. */
export function eventsBefore(reader: Reader, surveyId: string, before: number | null, limit: number): EventRow[] {
  const here = eq(events.surveyId, surveyId);
  return reader
    .select()
    .from(events)
    .where(before === null ? here : and(here, lt(events.sequence, before)))
    .orderBy(desc(events.sequence))
    .limit(limit)
    .all();
}

export function allEvents(reader: Reader, surveyId: string): EventRow[] {
  return reader.select().from(events).where(eq(events.surveyId, surveyId)).orderBy(events.sequence).all();
}

/** An event without what it tells. */
export type EventStep = Pick<EventRow, "sequence" | "at" | "kind" | "sha256">;

/** From a time on, in order. */
export function eventStepsSince(reader: Reader, surveyId: string, since: string): EventStep[] {
  return reader
    .select({ sequence: events.sequence, at: events.at, kind: events.kind, sha256: events.sha256 })
    .from(events)
    .where(and(eq(events.surveyId, surveyId), gte(events.at, since)))
    .orderBy(events.sequence)
    .all();
}

export function hasEvent(reader: Reader, surveyId: string, kinds: readonly EventKind[]): boolean {
  const found = reader
    .select({ sequence: events.sequence })
    .from(events)
    .where(and(eq(events.surveyId, surveyId), inArray(events.kind, [...kinds])))
    .limit(1)
    .get();
  return found !== undefined;
}

/** The newest event of any of these kinds. */
export function newestEventOf(reader: Reader, surveyId: string, kinds: readonly EventKind[]): EventRow | undefined {
  return reader
    .select()
    .from(events)
    .where(and(eq(events.surveyId, surveyId), inArray(events.kind, [...kinds])))
    .orderBy(desc(events.sequence))
    .limit(1)
    .get();
}
