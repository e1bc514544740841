import type { RecordEvent } from "#shared/api/record.ts";
import type { EventsView } from "../services/list-events.ts";

interface Events {
  events: RecordEvent[];
  newest: { sequence: number; sha256: string };
  keyFingerprint: string;
  elsewhere: { sameSource: number; sameFrame: number };
  more: boolean;
}

export function presentEvents({ events, newest, keyFingerprint, elsewhere, more, names }: EventsView): Events {
  return {
    events: events.map((row) => ({
      sequence: row.sequence,
      at: row.at,
      kind: row.kind,
      memberId: row.memberId,
      by: names.get(row.memberId) ?? "somebody",
      sha256: row.sha256,
      payload: JSON.parse(row.payload) as Record<string, unknown>,
    })),
    newest: { sequence: newest.sequence, sha256: newest.sha256 },
    keyFingerprint,
    elsewhere: { ...elsewhere },
    more,
  };
}
