import type { CurrentCount, Visit } from "#shared/api/field.ts";
import type { CountRow } from "../db/counts.ts";
import type { Closing } from "../services/close-pick.ts";
import type { VisitsView, VisitView } from "../services/read-visits.ts";

type Visits = { visits: Visit[] } & {
  drawId: string | null;
  frameId: string | null;
  targetId: string;
  picks: number;
  reservesLeft: number;
  completePrefix: number;
};

export function presentVisits(view: VisitsView): Visits {
  const { live, target } = view.season;
  return {
    drawId: live?.draw.id ?? null,
    frameId: live?.draw.frameVersionId ?? null,
    targetId: target.id,
    visits: view.visits.map(presentVisit),
    picks: view.picks,
    reservesLeft: view.reservesLeft,
    completePrefix: view.completePrefix,
  };
}

export function presentVisit(view: VisitView): Visit {
  const { visit, label, shareBillionths, orders, openedFor, assignment } = view;
  const { id, unit, column, row } = visit;
  const { eastM, northM, lng, lat } = view.centre;
  return {
    ...{ id, unit, column, row, label, shareBillionths, openedFor },
    orders: [...orders],
    state: view.closed ? "closed" : "in-use",
    centre: { eastM, northM, lng, lat },
    assignedTo: assignment ? { memberId: assignment.memberId, name: assignment.name, day: assignment.day } : null,
    count: currentCount(view.count, view.names),
  };
}

function currentCount(row: CountRow | undefined, names: ReadonlyMap<string, string>): CurrentCount {
  if (row === undefined) return { state: "not-visited" };
  const about = {
    entryId: row.id,
    by: names.get(row.observerId) ?? "somebody",
    at: row.madeAt,
    note: row.note,
    amended: row.replaces !== null,
  };
  if (row.state !== "counted") return { state: row.state, ...about };
  if (row.value === null) throw new Error(`count ${row.id} is counted and has no value`);
  return { state: "counted", value: row.value, ...about };
}

export function presentClosing(closing: Closing): {
  closed: number[];
  opened: { position: number; label: string; repeatsCountedCell: boolean }[];
  passedOver: number[];
  reservesLeft: number;
  unreplaced: number;
} {
  return {
    closed: [...closing.closed],
    opened: closing.opened.map(({ entry, repeatsCountedCell }) => ({
      position: entry.position,
      label: entry.label,
      repeatsCountedCell,
    })),
    passedOver: [...closing.passedOver],
    reservesLeft: closing.reservesLeft,
    unreplaced: closing.unreplaced,
  };
}
