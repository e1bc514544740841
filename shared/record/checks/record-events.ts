import { envelopeSha256, payloadSha256 } from "#shared/record/chain.ts";
import { EVENT_PAYLOADS, type EventKind, type EventPayload, isEventKind } from "#shared/record/events.ts";
import type { RecordFile } from "#shared/record/record-file.ts";

type StoredEvent = RecordFile["events"][number];

/** An event of a known kind, whole: envelope and payload are those that were hashed. */
export interface WholeEvent<K extends EventKind> {
  readonly sequence: number;
  readonly at: string;
  readonly member: string;
  readonly payload: EventPayload<K>;
}

/** What is wrong with an event by itself, apart from its place in the chain. */
export interface BrokenEvent {
  readonly event: StoredEvent;
  readonly place: number;
  readonly part: "envelope" | "payload" | "kind" | "shape";
  readonly expected: string;
}

/**
 * The events of a record, each looked at once. Other checks compare with whole events only, so that one change in the
 * file is named by one check.
 */
export class RecordEvents {
  readonly broken: readonly BrokenEvent[];
  readonly #whole: readonly { readonly event: StoredEvent; readonly payload: unknown }[];

  constructor(events: readonly StoredEvent[], tell: () => void) {
    const broken: BrokenEvent[] = [];
    const whole: { event: StoredEvent; payload: unknown }[] = [];
    events.forEach((event, place) => {
      if (place % 256 === 0) tell();
      const fault = faultOf(event);
      if (fault === null) whole.push({ event, payload: event.payload });
      else broken.push({ event, place, ...fault });
    });
    this.broken = broken;
    this.#whole = whole;
  }

  /** Whole events of one kind, in the order of the chain. */
  of<K extends EventKind>(kind: K): WholeEvent<K>[] {
    return this.#whole
      .filter(({ event }) => event.envelope.kind === kind)
      .map(({ event, payload }) => ({
        sequence: event.envelope.sequence,
        at: event.envelope.at,
        member: event.envelope.member,
        payload: payload as EventPayload<K>,
      }));
  }

  /** "event 17", when an event of one of these kinds is broken, so that a comparison with the events says little. */
  brokenAmong(kinds: readonly EventKind[]): string | null {
    const found = this.broken.find(
      ({ event, part }) => part === "kind" || kinds.some((k) => k === event.envelope.kind),
    );
    return found === undefined ? null : `event ${found.event.envelope.sequence}`;
  }
}

function faultOf(event: StoredEvent): Pick<BrokenEvent, "part" | "expected"> | null {
  const envelope = envelopeSha256(event.envelope);
  if (envelope !== event.sha256) return { part: "envelope", expected: envelope };
  const payload = payloadSha256(event.salt, event.payload);
  if (payload !== event.envelope.payloadSha256) return { part: "payload", expected: payload };
  const { kind } = event.envelope;
  if (!isEventKind(kind)) return { part: "kind", expected: "a kind that this version knows" };
  return EVENT_PAYLOADS[kind].safeParse(event.payload).success
    ? null
    : { part: "shape", expected: `the members of "${kind}"` };
}
