import { type CountStanding, countsInForce } from "#shared/counts/in-force.ts";
import type { Entry } from "#shared/draw/draw.ts";
import { type EntriesInUse, entriesInUse, type FieldAct } from "#shared/field/in-use.ts";
import { isClosing, type VisitState } from "#shared/field/states.ts";
import { Problem } from "#shared/problem.ts";
import type { CountPayload } from "#shared/record/events.ts";
import type { ReplayRun } from "./check.ts";
import type { Declared, StoredDraw } from "./declared.ts";
import type { WholeEvent } from "./record-events.ts";

/** An act on a draw's list, as the events have it. */
export interface ActOfEvent {
  readonly act: Exclude<FieldAct, { readonly kind: "add" }>;
  readonly stratum: string;
  readonly event: WholeEvent<"pick-closed"> | WholeEvent<"count-amended">;
}

/** One stratum's list of a draw after its acts, up to an event. */
export interface ListStanding {
  readonly stratum: string;
  readonly picks: number;
  readonly entries: readonly Entry[];
  readonly acts: readonly ActOfEvent[];
  readonly use: EntriesInUse;
}

/**
 * The acts on a draw's lists, told by the events alone up to `until`: closings, and amendments that take a counted cell
 * out of use or bring a closed one back (rule R6). Lists are those that the replay drew.
 * @throws Problem `pick-not-in-use` where an event closes a cell that the lists don't hold
 */
export function listsStanding(
  run: ReplayRun,
  { stored, draw }: Declared & { readonly draw: StoredDraw },
  until = Number.POSITIVE_INFINITY,
): ListStanding[] {
  const again = run.lists.get(stored.id) ?? null;
  if (again === null || again instanceof Problem) return [];
  const made = run.events.of("draw-made").find(({ payload }) => payload.drawId === draw.id)?.sequence ?? 0;
  const ended = run.events.of("draw-withdrawn").find(({ payload }) => payload.drawId === draw.id)?.sequence;
  const isWhile = ({ sequence }: { sequence: number }): boolean =>
    sequence > made && sequence <= until && (ended === undefined || sequence < ended);
  const seasonOf = new Map(run.record.visits.map((visit) => [visit.id, visit.seasonId]));
  const happened = [
    ...run.events.of("pick-closed").filter(({ payload }) => payload.drawId === draw.id),
    ...run.events
      .of("count-amended")
      .filter(({ payload }) => payload.purpose === "first" && payload.frameId === draw.frameId)
      .filter(({ payload }) => seasonOf.get(payload.visitId) === stored.seasonId),
  ]
    .filter(isWhile)
    .toSorted((a, b) => a.sequence - b.sequence);
  const stateOf = statesByEntry(run);
  return again.map(({ stratum, entries }) => {
    const picks = entries.filter(({ reserve }) => !reserve).length;
    const acts: ActOfEvent[] = [];
    let use = entriesInUse(entries, picks, []);
    for (const event of happened) {
      const act = actOf(event, stratum, use, entries, stateOf);
      if (act === null) continue;
      acts.push({ act, stratum, event });
      use = entriesInUse(
        entries,
        picks,
        acts.map((one) => one.act),
      );
    }
    return { stratum, picks, entries, acts, use };
  });
}

function statesByEntry(run: ReplayRun): ReadonlyMap<string, VisitState> {
  return new Map(
    [...run.events.of("count-entered"), ...run.events.of("count-amended")].map(({ payload }) => [
      payload.entryId,
      payload.state,
    ]),
  );
}

function actOf(
  event: ActOfEvent["event"],
  stratum: string,
  use: EntriesInUse,
  entries: readonly Entry[],
  stateOf: ReadonlyMap<string, VisitState>,
): ActOfEvent["act"] | null {
  const { payload } = event;
  if ("drawId" in payload) return payload.stratum === stratum ? { kind: "close", unit: payload.unit } : null;
  const { unit, state, replaces } = payload;
  if (!entries.some((entry) => entry.unit === unit && entry.position <= use.openedTo)) return null;
  const closed = use.closed.some((entry) => entry.unit === unit);
  const before = replaces === null ? undefined : stateOf.get(replaces);
  if (before !== undefined && !isClosing(before) && isClosing(state) && !closed) return { kind: "close-counted", unit };
  return !isClosing(state) && closed ? { kind: "reopen", unit } : null;
}

/** How each cell stands for a target on a frame and season, told by the events alone up to one of them. */
export function countsStanding(
  run: ReplayRun,
  where: { readonly frameId: string; readonly seasonId: string; readonly targetId: string },
  until = Number.POSITIVE_INFINITY,
): Map<number, CountStanding<CountPayload>> {
  const seasonOf = new Map(run.record.visits.map((visit) => [visit.id, visit.seasonId]));
  return countsInForce(
    [...run.events.of("count-entered"), ...run.events.of("count-amended")]
      .filter(({ sequence }) => sequence <= until)
      .toSorted((a, b) => a.sequence - b.sequence)
      .map(({ payload }) => payload)
      .filter(({ purpose, frameId, targetId }) => {
        return purpose === "first" && frameId === where.frameId && targetId === where.targetId;
      })
      .filter(({ visitId }) => seasonOf.get(visitId) === where.seasonId)
      .map((payload) => [payload.unit, payload]),
  );
}
