import type { Entry } from "#shared/draw/draw.ts";
import { Problem } from "#shared/problem.ts";

/**
 * What can happen to a stratum's list after the draw, in the order of the events.
 * - close: the cell could not be counted; a reserve opens for each of its picks in use.
 * - close-counted: a cell that had a count was amended to such a state; no reserve opens.
 * - reopen: a closed cell was counted after all; it is in use again, and the reserves that it opened stay.
 * - add: so many further picks are wanted.
 */
export type FieldAct =
  | { readonly kind: "close"; readonly unit: number }
  | { readonly kind: "close-counted"; readonly unit: number }
  | { readonly kind: "reopen"; readonly unit: number }
  | { readonly kind: "add"; readonly count: number };

/** A reserve that was opened, and the closed pick that it stands for; null where it was added. */
export interface Opening {
  readonly position: number;
  readonly because: number | null;
}

/** A reserve whose turn came while its cell was closed. */
export interface PassedOver {
  readonly position: number;
  readonly unit: number;
  readonly because: number | null;
}

export interface EntriesInUse {
  /** The opened prefix less what is closed, in draw order. */
  readonly inUse: readonly Entry[];
  /** Picks that were in use and are closed. */
  readonly closed: readonly Entry[];
  readonly passedOver: readonly PassedOver[];
  /** Every opening, in the order of the acts. */
  readonly opened: readonly Opening[];
  /** Position of the last entry of the opened prefix. */
  readonly openedTo: number;
  readonly reservesLeft: number;
  /** Openings that found the list at its end: lengthen it by the same stream, then ask again. */
  readonly unfilled: number;
}

interface State {
  readonly entries: readonly Entry[];
  readonly byUnit: ReadonlyMap<number, readonly Entry[]>;
  openedTo: number;
  unfilled: number;
  readonly closedUnits: Set<number>;
  /** Positions that another entry stands for already: closing their cell again opens none. */
  readonly replaced: Set<number>;
  readonly opened: Opening[];
  readonly passedOver: PassedOver[];
}

/** The entries of each unit, in the order given. */
export function groupByUnit(entries: readonly Entry[]): Map<number, Entry[]> {
  const byUnit = new Map<number, Entry[]>();
  for (const entry of entries) {
    const known = byUnit.get(entry.unit);
    if (known === undefined) byUnit.set(entry.unit, [entry]);
    else known.push(entry);
  }
  return byUnit;
}

function openNext(state: State, because: number | null): void {
  for (;;) {
    const next = state.entries[state.openedTo];
    if (next === undefined) {
      state.unfilled += 1;
      return;
    }
    state.openedTo += 1;
    if (!state.closedUnits.has(next.unit)) {
      state.opened.push({ position: next.position, because });
      return;
    }
    state.replaced.add(next.position);
    state.passedOver.push({ position: next.position, unit: next.unit, because });
  }
}

function close(state: State, unit: number, opensReserves: boolean): void {
  if (state.closedUnits.has(unit)) return;
  const picks = (state.byUnit.get(unit) ?? []).filter((entry) => entry.position <= state.openedTo);
  if (picks.length === 0) {
    throw new Problem("pick-not-in-use", `No pick in use is of unit ${unit}. Close a cell that is to be visited.`);
  }
  state.closedUnits.add(unit);
  if (!opensReserves) return;
  for (const pick of picks) {
    if (state.replaced.has(pick.position)) continue;
    state.replaced.add(pick.position);
    openNext(state, pick.position);
  }
}

function apply(state: State, act: FieldAct): void {
  switch (act.kind) {
    case "close":
      close(state, act.unit, true);
      return;
    case "close-counted":
      close(state, act.unit, false);
      return;
    case "reopen":
      state.closedUnits.delete(act.unit);
      return;
    case "add":
      if (!Number.isSafeInteger(act.count) || act.count < 1) throw new RangeError(`cannot add ${act.count} picks`);
      for (let i = 0; i < act.count; i += 1) openNext(state, null);
      return;
  }
}

/**
 * Which entries of one stratum's list are in use after a sequence of acts (rule R6). At first the `picks` first entries
 * are. Closing a cell opens the next unopened entry for each time the cell stands among the picks in use; an added pick
 * opens the next one. An opened entry may repeat a counted cell, whose count then enters again; one that falls on a
 * closed cell is passed over, on record, and the next opens. So what is in use is always a prefix of the list less what
 * is closed, and nobody chooses a cell. A cell that is closed already may be closed again without effect.
 * @param entries the whole list, reserves included, in draw order
 * @throws Problem `pick-not-in-use` where a closed cell is not in the opened prefix.
 */
export function entriesInUse(entries: readonly Entry[], picks: number, acts: readonly FieldAct[]): EntriesInUse {
  if (!Number.isSafeInteger(picks) || picks < 0 || picks > entries.length) {
    throw new RangeError(`${picks} picks of a list of ${entries.length}`);
  }
  const state: State = {
    entries,
    byUnit: groupByUnit(entries),
    openedTo: picks,
    unfilled: 0,
    closedUnits: new Set(),
    replaced: new Set(),
    opened: [],
    passedOver: [],
  };
  for (const act of acts) apply(state, act);
  const prefix = entries.slice(0, state.openedTo);
  const stillPassedOver = state.passedOver.filter((entry) => state.closedUnits.has(entry.unit));
  const passedOverPositions = new Set(stillPassedOver.map((entry) => entry.position));
  return {
    inUse: prefix.filter((entry) => !state.closedUnits.has(entry.unit)),
    closed: prefix.filter((entry) => state.closedUnits.has(entry.unit) && !passedOverPositions.has(entry.position)),
    passedOver: stillPassedOver,
    opened: state.opened,
    openedTo: state.openedTo,
    reservesLeft: entries.length - state.openedTo,
    unfilled: state.unfilled,
  };
}
