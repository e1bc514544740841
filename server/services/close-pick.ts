import { entriesInUse } from "#shared/field/in-use.ts";
import type { ClosingState } from "#shared/field/states.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { type CountRow, entriesInForce, entryInForce } from "../db/counts.ts";
import type { EntryRow } from "../db/draws.ts";
import { type Reader, type Tx, writeTx } from "../db/open.ts";
import { insertPickAct, pickActsOf, type VisitRow, visitsOn } from "../db/visits.ts";
import { actingMember } from "./acting-member.ts";
import { listInUseWith, type StratumInUse } from "./draw-in-use.ts";
import { lengthenList } from "./lengthen-list.ts";
import { bringsValue, cellName, inWords, keepEntry, keptBefore, visitHere } from "./keep-entry.ts";
import { openVisitsFor } from "./open-visits-for.ts";
import { seasonInUse } from "./read-visits.ts";
import { recordEvent } from "./record-event.ts";

interface Wanted {
  /** Made by the client: the id of the count entry that says why. */
  readonly id: string;
  readonly state: ClosingState;
  readonly reason: string;
}

/** What closing a cell did to the list. */
export interface Closing {
  readonly closed: readonly number[];
  readonly opened: readonly { readonly entry: EntryRow; readonly repeatsCountedCell: boolean }[];
  readonly passedOver: readonly number[];
  readonly reservesLeft: number;
  /** Picks that found no reserve left: without replacement a list ends with the frame. */
  readonly unreplaced: number;
}

/**
 * Says why a cell can't be counted, and opens the next reserve for each of its picks in use, strictly in draw order
 * (rule R6): nobody chooses a cell. A list that runs short is lengthened by its stream. Pressed twice it answers the same and does nothing more.
 */
export function closePick(ctx: Context, visitId: string, wanted: Wanted): Closing {
  return writeTx(ctx.db, (tx) => {
    const visit = visitHere(tx, ctx.surveyId, visitId);
    const { drawId, list } = pickInUse(tx, ctx, visit);
    const memberId = actingMember(ctx);
    if (list.use.closed.some((entry) => entry.unit === visit.unit)) {
      const again = pickActsOf(tx, drawId, visit.seasonId)
        .toReversed()
        .find((act) => act.kind === "close" && act.unit === visit.unit);
      if (again?.actedBy === memberId && again.state === wanted.state && again.reason === wanted.reason) {
        return closingOf(tx, ctx, visit, list);
      }
      throw new Problem(
        "pick-not-in-use",
        `Cell ${cellName(tx, visit)} is closed already. Amend its count if it is wrong.`,
      );
    }
    const at = ctx.now().toISOString();
    keepState(tx, ctx, visit, wanted, at);
    insertPickAct(tx, {
      drawId,
      seasonId: visit.seasonId,
      kind: "close",
      stratum: list.stratum,
      unit: visit.unit,
      count: null,
      state: wanted.state,
      reason: wanted.reason,
      actedBy: memberId,
      actedAt: at,
    });
    lengthenList(tx, ctx, drawId, pickInUse(tx, ctx, visit).list, at);
    const closing = closingOf(tx, ctx, visit, pickInUse(tx, ctx, visit).list);
    const opened = closing.opened.map(({ entry }) => entry);
    openVisitsFor(tx, ctx, { seasonId: visit.seasonId, frameId: visit.frameVersionId, at }, opened);
    recordEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId,
      kind: "pick-closed",
      payload: {
        version: 1,
        drawId,
        stratum: list.stratum,
        unit: visit.unit,
        state: wanted.state,
        reason: wanted.reason,
        closed: [...closing.closed],
        opened: opened.map((entry) => entry.position),
        passedOver: [...closing.passedOver],
      },
    });
    return closing;
  });
}

function pickInUse(reader: Reader, ctx: Context, visit: VisitRow): { drawId: string; list: StratumInUse } {
  const { live, lists, seasonId } = seasonInUse(reader, ctx.surveyId);
  const here = live?.draw.frameVersionId === visit.frameVersionId && seasonId === visit.seasonId;
  const list = here ? listInUseWith(lists, visit.unit) : undefined;
  if (!live || !list) {
    throw new Problem(
      "pick-not-in-use",
      `No pick of the live draw is cell ${cellName(reader, visit)}. Reload the list of cells.`,
    );
  }
  return { drawId: live.draw.id, list };
}

/** The count entry with the closing state: written now, or there already when somebody came back with it. */
function keepState(tx: Tx, ctx: Context, visit: VisitRow, wanted: Wanted, at: string): void {
  const { target } = seasonInUse(tx, ctx.surveyId);
  const inForce = entryInForce(tx, visit.id, target.id);
  if (inForce && bringsValue(inForce.state)) {
    throw new Problem(
      "count-exists",
      `Cell ${cellName(tx, visit)} was counted: ${inWords(inForce)}. Amend the count if that is wrong; a counted cell opens no reserve.`,
    );
  }
  if (inForce?.state === wanted.state) return;
  const memberId = actingMember(ctx);
  const row: CountRow = {
    id: wanted.id,
    visitId: visit.id,
    targetId: target.id,
    observerId: inForce?.observerId ?? memberId,
    purpose: "first",
    state: wanted.state,
    value: null,
    replaces: inForce?.id ?? null,
    reason: wanted.reason,
    note: "",
    importId: null,
    enteredBy: memberId,
    enteredAt: at,
    madeAt: at,
  };
  if (keptBefore(tx, row)) {
    throw new Problem(
      "count-exists",
      `What was said of cell ${cellName(tx, visit)} has been amended since. Reload the page, then close it again.`,
    );
  }
  keepEntry(tx, ctx, visit, row);
}

/** The last closing of a cell: its list just before and just after that act, compared. */
function closingOf(reader: Reader, ctx: Context, visit: VisitRow, list: StratumInUse): Closing {
  const at = list.acts.findLastIndex((act) => act.kind === "close" && act.unit === visit.unit);
  const before = entriesInUse(list.entries, list.picks, list.acts.slice(0, at));
  const after = entriesInUse(list.entries, list.picks, list.acts.slice(0, at + 1));
  const known = new Set(before.passedOver.map((entry) => entry.position));
  const rows = new Map(list.entries.map((entry) => [entry.position, entry]));
  const { target } = seasonInUse(reader, ctx.surveyId);
  const counts = entriesInForce(reader, visit.seasonId, target.id);
  const counted = new Set(
    visitsOn(reader, visit.seasonId, visit.frameVersionId)
      .filter(({ id }) => {
        const count = counts.get(id);
        return count !== undefined && bringsValue(count.state);
      })
      .map(({ unit }) => unit),
  );
  return {
    closed: before.inUse.filter((entry) => entry.unit === visit.unit).map((entry) => entry.position),
    opened: after.opened.slice(before.opened.length).flatMap(({ position }) => {
      const entry = rows.get(position);
      return entry ? [{ entry, repeatsCountedCell: counted.has(entry.unit) }] : [];
    }),
    passedOver: after.passedOver.map((entry) => entry.position).filter((position) => !known.has(position)),
    reservesLeft: after.reservesLeft,
    unreplaced: after.unfilled - before.unfilled,
  };
}
