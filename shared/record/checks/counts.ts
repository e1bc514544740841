import { dayOrTime, isBefore, localText, zoneClock } from "#shared/counts/zone-time.ts";
import type { CountPayload } from "#shared/record/events.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import {
  type Check,
  counted,
  differ,
  differInMembers,
  type Difference,
  firstDifference,
  notChecked,
  type ReplayRun,
  shown,
  verdict,
} from "./check.ts";
import type { WholeEvent } from "./record-events.ts";

type StoredCount = RecordFile["counts"][number];
type CountEvent = WholeEvent<"count-entered"> | WholeEvent<"count-amended">;

const TITLE = "The counts are those of the events";

/**
 * Each count in the list is that of its event, member by member, made in the cell that the event names; and no event's
 * count is missing from the list.
 */
export function checkCounts(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(["count-entered", "count-amended", "counts-imported"]);
  if (broken !== null) return [notChecked("counts", TITLE, `Not compared: ${broken} is not whole.`)];
  const { counts } = run.record;
  if (counts.length === 0 && countEvents(run).length === 0) {
    return [notChecked("counts", TITLE, "Nothing is counted yet.")];
  }
  const zeros = counts.filter(({ state, value }) => state === "counted" && value === 0).length;
  return [
    verdict(
      "counts",
      TITLE,
      firstDifference([() => compareAll(run), () => missingCount(run), () => importsDifference(run)]),
      [`${counted(counts.length, "count")}, ${zeros} of them zero`, ...countedTooSoon(run)].join("; "),
    ),
  ];
}

const MOST_NAMED = 5;

/**
 * Counts that are dated before their cell was drawn, or opened as a reserve: told, since nobody could have known then which
 * cells to visit. A date without a time stands for its whole day in the survey's time zone.
 */
function countedTooSoon(run: ReplayRun): string[] {
  const clock = zoneClock(run.record.survey.timeZone);
  const places = placesOf(run);
  const opened = new Map(run.record.visits.map(({ id, openedAt }) => [id, openedAt]));
  const found = run.record.counts.flatMap(({ visitId, madeAt }) => {
    const since = opened.get(visitId);
    if (since === undefined || !isBefore(madeAt, since, clock)) return [];
    const [day, from] = [dayOrTime(madeAt, clock), clock.localOf(since)].map(localText);
    return [`${places.get(visitId) ?? `visit ${visitId}`} on ${day ?? ""}, to be visited from ${from ?? ""}`];
  });
  if (found.length === 0) return [];
  const were = found.length === 1 ? "is dated before its cell was" : "are dated before their cells were";
  const more = found.length > MOST_NAMED ? [`${found.length - MOST_NAMED} more`] : [];
  const told = `${counted(found.length, "count")} ${were} drawn or opened (${run.record.survey.timeZone})`;
  return [`${told}: ${[...found.slice(0, MOST_NAMED), ...more].join("; ")}`];
}

function countEvents(run: ReplayRun): CountEvent[] {
  return [...run.events.of("count-entered"), ...run.events.of("count-amended")];
}

function compareAll(run: ReplayRun): Difference | null {
  const byEntry = new Map(countEvents(run).map((event) => [event.payload.entryId, event]));
  const places = placesOf(run);
  const visits = new Map(run.record.visits.map((visit) => [visit.id, visit]));
  for (const count of run.record.counts) {
    const where = places.get(count.visitId) ?? `visit ${count.visitId}`;
    const event = byEntry.get(count.id);
    const difference =
      event === undefined
        ? { where, found: `${said(count)}, entry ${count.id}`, expected: "no such entry: no event holds it" }
        : compare(where, count, event, visits.get(count.visitId));
    if (difference !== null) return difference;
  }
  return null;
}

function missingCount(run: ReplayRun): Difference | null {
  const listed = new Set(run.record.counts.map(({ id }) => id));
  const event = countEvents(run).find(({ payload }) => !listed.has(payload.entryId));
  if (event === undefined) return null;
  const where = placesOf(run).get(event.payload.visitId) ?? `unit ${event.payload.unit}`;
  return { where, found: "no such count", expected: `${said(event.payload)}, as event ${event.sequence} says` };
}

/** Tables that were read in: the same in the list and in the events. */
function importsDifference(run: ReplayRun): Difference | null {
  const events = run.events.of("counts-imported");
  const { countImports } = run.record;
  return firstDifference([
    () => differ("imported tables", countImports.length, events.length),
    ...events.map((event) => () => {
      const { importId, fileName, fileSha256: sha256, written } = event.payload;
      const found = countImports.find(({ id }) => id === importId);
      const expected = { fileName, sha256, written, importedAt: event.at, member: event.member };
      return differInMembers(`table of event ${event.sequence}`, found ?? {}, expected);
    }),
  ]);
}

function compare(
  where: string,
  count: StoredCount,
  event: CountEvent,
  visit: RecordFile["visits"][number] | undefined,
): Difference | null {
  const { payload } = event;
  if (count.state !== payload.state || !Object.is(count.value, payload.value)) {
    return { where, found: said(count), expected: `${said(payload)}, as event ${event.sequence} says` };
  }
  const members: [string, unknown, unknown][] = [
    ["visit", count.visitId, payload.visitId],
    ["frame of the visit", visit?.frameId, payload.frameId],
    ["unit of the visit", visit?.unit, payload.unit],
    ["target", count.targetId, payload.targetId],
    ["counted by", count.observer, payload.observer],
    ["purpose", count.purpose, payload.purpose],
    ["entry it replaces", count.replaces, payload.replaces],
    ["reason", count.reason, payload.reason],
    ["note", count.note, payload.note],
    ["table it came from", count.importId, payload.importId],
    ["counted at", count.madeAt, payload.madeAt],
    ["entered by", count.enteredBy, event.member],
    ["entered at", count.enteredAt, event.at],
  ];
  return firstDifference(
    members.map(([name, found, expected]) => () => {
      const difference = differ(`${where}, ${name}`, found, expected);
      return difference && { ...difference, expected: `${difference.expected}, as event ${event.sequence} says` };
    }),
  );
}

/** What was said of a cell: its number, or the state for which it has none. */
export function said(count: Pick<CountPayload, "state" | "value">): string {
  return count.state === "counted" ? String(count.value) : shown(count.state);
}

/** By visit id: "cell G7 (unit 131)", the label from a draw's list. */
export function placesOf(run: ReplayRun): Map<string, string> {
  const labels = new Map<string, string>();
  for (const draw of run.record.draws) {
    for (const { entries } of draw.lists) {
      for (const { unit, label } of entries) labels.set(`${draw.frameId} ${unit}`, label);
    }
  }
  return new Map(
    run.record.visits.map(({ id, frameId, unit }) => {
      const label = labels.get(`${frameId} ${unit}`);
      return [id, label === undefined ? `unit ${unit}` : `cell ${label} (unit ${unit})`];
    }),
  );
}
