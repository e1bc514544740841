import { isClosing, type VisitState } from "#shared/field/states.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { type CountRow, findEntry, insertEntry } from "../db/counts.ts";
import type { Reader, Tx } from "../db/open.ts";
import { type TargetRow, targetsOf } from "../db/surveys.ts";
import { findVisit, type VisitRow } from "../db/visits.ts";
import { framePlaces } from "./frame-places.ts";
import { recordEvent } from "./record-event.ts";

/** What somebody says of a cell: a number when it was counted, a state when it was not. */
export type Said =
  { readonly state: "counted"; readonly value: number } | { readonly state: Exclude<VisitState, "counted"> };

export const valueOf = (said: Said): number | null => (said.state === "counted" ? said.value + 0 : null);

/** Whether a state brings a value into the estimate: a number, or the 0 of a cell outside the population. */
export const bringsValue = (state: VisitState): boolean => !isClosing(state);

/** The name of a cell in a message. */
export function cellName(reader: Reader, visit: VisitRow): string {
  return framePlaces(reader, visit.frameVersionId).labelOf(visit.column, visit.row);
}

/** A visit of this survey. @throws Problem `cell-not-drawn` */
export function visitHere(reader: Reader, surveyId: string, visitId: string): VisitRow {
  const visit = findVisit(reader, visitId);
  if (visit?.surveyId !== surveyId) {
    throw new Problem(
      "cell-not-drawn",
      "This cell is not to be visited in this survey. Choose one from the list of cells.",
    );
  }
  return visit;
}

/** A target of this survey that can take what was said. @throws Problem `count-invalid` */
export function checkSaid(reader: Reader, surveyId: string, targetId: string, said: Said, visit: VisitRow): TargetRow {
  const target = targetsOf(reader, surveyId).find((row) => row.id === targetId);
  if (!target) throw new Problem("count-invalid", "This survey does not count that target. Choose one of its targets.");
  if (said.state === "counted" && target.wholeNumbers && !Number.isInteger(said.value)) {
    throw new Problem(
      "count-invalid",
      `${said.value} in cell ${cellName(reader, visit)} is not a whole number, and ${target.plural} are counted whole. Enter a whole number.`,
    );
  }
  return target;
}

/**
 * The entry that was kept under this id, if it says the same: an entry that is sent twice is kept once.
 * @throws Problem `count-invalid` where the id stands for something else.
 */
export function keptBefore(reader: Reader, row: CountRow): CountRow | undefined {
  const kept = findEntry(reader, row.id);
  if (!kept) return undefined;
  const same =
    kept.visitId === row.visitId &&
    kept.targetId === row.targetId &&
    kept.state === row.state &&
    kept.value === row.value &&
    kept.replaces === row.replaces &&
    kept.note === row.note &&
    kept.enteredBy === row.enteredBy;
  if (same) return kept;
  throw new Problem(
    "count-invalid",
    "Another entry was kept under this id. Reload the page and enter the count again.",
  );
}

/** Writes an entry and its event. */
export function keepEntry(tx: Tx, ctx: Context, visit: VisitRow, row: CountRow): void {
  insertEntry(tx, row);
  recordEvent(tx, ctx, {
    surveyId: ctx.surveyId,
    at: row.enteredAt,
    memberId: row.enteredBy,
    kind: row.replaces === null ? "count-entered" : "count-amended",
    payload: {
      version: 1,
      entryId: row.id,
      visitId: row.visitId,
      frameId: visit.frameVersionId,
      unit: visit.unit,
      targetId: row.targetId,
      observer: row.observerId,
      purpose: row.purpose,
      state: row.state,
      value: row.value,
      replaces: row.replaces,
      reason: row.reason,
      note: row.note,
      madeAt: row.madeAt,
      importId: row.importId,
    },
  });
}

/** An entry in words, for messages: "3", "zero", "not reached". */
export function inWords(entry: Pick<CountRow, "state" | "value">): string {
  if (entry.state !== "counted") return entry.state.replaceAll("-", " ");
  return entry.value === null ? "no value" : String(entry.value);
}
