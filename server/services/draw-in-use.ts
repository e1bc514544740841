import type { DrawEntry } from "#shared/api/draw.ts";
import { type EntriesInUse, entriesInUse, type FieldAct } from "#shared/field/in-use.ts";
import { entriesOf, type EntryRow } from "../db/draws.ts";
import type { Reader } from "../db/open.ts";
import { type PickActRow, pickActsOf } from "../db/visits.ts";

/** One stratum's list of a draw and what its acts have made of it. */
export interface StratumInUse {
  readonly stratum: string;
  /** n: the first so many entries are picks. */
  readonly picks: number;
  readonly entries: readonly EntryRow[];
  readonly acts: readonly FieldAct[];
  readonly use: EntriesInUse;
}

/** What is in use, closed and left of a draw in a season, stratum by stratum. */
export function drawInUse(reader: Reader, drawId: string, seasonId: string): StratumInUse[] {
  const lists = new Map<string, EntryRow[]>();
  for (const entry of entriesOf(reader, drawId)) {
    const list = lists.get(entry.stratum);
    if (list) list.push(entry);
    else lists.set(entry.stratum, [entry]);
  }
  const rows = pickActsOf(reader, drawId, seasonId);
  return [...lists].map(([stratum, entries]) => {
    const picks = entries.filter((entry) => !entry.reserve).length;
    const acts = rows.filter((row) => row.stratum === stratum).map(fieldAct);
    return { stratum, picks, entries, acts, use: entriesInUse(entries, picks, acts) };
  });
}

function fieldAct(row: PickActRow): FieldAct {
  if (row.kind === "add") {
    if (row.count === null) throw new Error(`act ${row.sequence} of draw ${row.drawId} adds nothing`);
    return { kind: row.kind, count: row.count };
  }
  if (row.unit === null) throw new Error(`act ${row.sequence} of draw ${row.drawId} names no unit`);
  return { kind: row.kind, unit: row.unit };
}

/** How each entry of a list stands, and which closed pick it was opened for, by position. */
export function entryStates(list: StratumInUse): Map<number, Pick<DrawEntry, "state" | "openedFor">> {
  const { use } = list;
  const openedFor = new Map(use.opened.map(({ position, because }) => [position, because]));
  const states = new Map<number, Pick<DrawEntry, "state" | "openedFor">>();
  const tell = (positions: Iterable<{ readonly position: number }>, state: DrawEntry["state"]) => {
    for (const { position } of positions) states.set(position, { state, openedFor: openedFor.get(position) ?? null });
  };
  tell(list.entries, "reserve");
  tell(use.inUse, "in-use");
  tell(use.closed, "closed");
  tell(use.passedOver, "passed-over");
  return states;
}

/** The list that holds a unit among its opened entries, if any does. */
export function listInUseWith(lists: readonly StratumInUse[], unit: number): StratumInUse | undefined {
  return lists.find((list) => list.entries.some((entry) => entry.unit === unit && entry.position <= list.use.openedTo));
}
