import type * as z from "zod/mini";
import type { listVisits, Visit } from "#shared/api/field.ts";
import type { Member } from "#shared/api/people.ts";

export type VisitList = z.input<typeof listVisits.answer.schema>;

export function visit(number: number, part: Partial<Visit> = {}): Visit {
  return {
    id: `v${number}`,
    unit: number,
    column: number,
    row: 0,
    label: `A${number}`,
    shareBillionths: 1_000_000_000,
    orders: [number],
    state: "in-use",
    openedFor: null,
    centre: { eastM: 431_210, northM: 5_712_430, lng: 2.000123, lat: 51.000456 },
    assignedTo: null,
    count: { state: "not-visited" },
    ...part,
  };
}

type Settled = Exclude<Visit["count"]["state"], "not-visited" | "counted">;

/** The word why there is no number. */
export function reported(state: Settled): Visit["count"] {
  return {
    state,
    entryId: "0c4a7a4e-4f43-4d52-9f0f-1f2e7a0c0001",
    by: "Tove Lind",
    at: "2031-06-05T09:00:00Z",
    note: "",
    amended: false,
  };
}

export function counted(value: number): Visit["count"] {
  return {
    state: "counted",
    value,
    entryId: "0c4a7a4e-4f43-4d52-9f0f-1f2e7a0c0002",
    by: "Tove Lind",
    at: "2031-06-05T09:00:00Z",
    note: "",
    amended: false,
  };
}

export function visitList(visits: Visit[], part: Partial<VisitList> = {}): VisitList {
  return {
    drawId: "w1",
    frameId: "f1",
    targetId: "t1",
    visits,
    picks: visits.length,
    reservesLeft: 3,
    completePrefix: 0,
    ...part,
  };
}

export const people: Member[] = [
  {
    id: "m1",
    name: "Ines Marrow",
    email: "ines@example.org",
    roles: ["lead"],
    addedAt: "2031-05-02T08:00:00Z",
    isSelf: false,
    isClosed: false,
  },
  {
    id: "m2",
    name: "Tove Lind",
    email: "tove@example.org",
    roles: ["counter"],
    addedAt: "2031-05-02T08:00:00Z",
    isSelf: false,
    isClosed: false,
  },
  {
    id: "m3",
    name: "Ada Quill",
    email: "ada@example.org",
    roles: ["auditor"],
    addedAt: "2031-05-02T08:00:00Z",
    isSelf: false,
    isClosed: false,
  },
];
