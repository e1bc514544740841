import type { DrawEntries } from "#shared/draw/draw.ts";
import { entriesSha256 } from "#shared/draw/entries-hash.ts";
import { labelOf, unitAt } from "#shared/frame/list.ts";
import { Problem } from "#shared/problem.ts";
import {
  type Check,
  counted,
  differ,
  type Difference,
  failed,
  firstDifference,
  notChecked,
  passed,
  type ReplayRun,
  verdict,
} from "./check.ts";
import { type Declared, declaredOf, type StoredDraw } from "./declared.ts";
import type { RebuiltFrame } from "./frame-rebuilt.ts";
import { lengtheningDifference } from "./lengthened.ts";

/**
 * Repeats every draw from frame hash, N, design, seed and generator (rule R6), withdrawn ones too; and computes what an
 * abandoned declaration would have picked once its seed is public (rule R7).
 */
export function checkDraws(run: ReplayRun): Check[] {
  return declaredOf(run.record, run.events).flatMap((declared) => {
    if (declared.draw !== null) return [checkDraw(run, declared, declared.draw)];
    return declared.stored.seed === null ? [] : [listAbandoned(run, declared)];
  });
}

function checkDraw(run: ReplayRun, declared: Declared, draw: StoredDraw): Check {
  const id = `draw-${draw.number}`;
  const title = `Draw ${draw.number}, ${draw.withdrawn === null ? "live" : "withdrawn"}, comes out the same`;
  const frame = run.frames.get(draw.frameId);
  const listed = draw.lists.reduce((sum, { entries }) => sum + entries.length, 0);
  const again = run.lists.get(declared.stored.id) ?? null;
  if (again === null) return notChecked(id, title, "Its declaration, seed or frame is not as it was hashed.");
  if (again instanceof Problem) {
    return failed(id, title, {
      where: `draw ${draw.number}`,
      found: "a list",
      expected: `a refusal: ${again.message}`,
    });
  }
  run.tell();
  const difference = firstDifference([
    () => compareLists(draw, again),
    () => compareCells(draw, frame),
    () => compareEvent(run, draw, again),
    () => lengtheningDifference(run, { ...declared, draw }, again),
  ]);
  const picks = draw.lists.reduce((sum, { entries }) => sum + entries.filter(({ reserve }) => !reserve).length, 0);
  const reason = draw.withdrawn === null ? "" : `. Withdrawn: “${draw.withdrawn.reason}”`;
  return verdict(
    id,
    title,
    difference,
    `${counted(picks, "pick")} and ${counted(listed - picks, "reserve")}, ${listed} equal${reason}`,
  );
}

function compareLists(draw: StoredDraw, again: DrawEntries): Difference | null {
  return firstDifference([
    () => differ(`draw ${draw.number}, number of lists`, draw.lists.length, again.length),
    ...again.map((list, place) => () => compareList(draw, place, list)),
  ]);
}

function compareList(draw: StoredDraw, place: number, list: DrawEntries[number]): Difference | null {
  const found = draw.lists[place];
  if (found === undefined) return null;
  if (found.stratum !== list.stratum) return differ(`draw ${draw.number}, stratum`, found.stratum, list.stratum);
  const stratum = list.stratum === "" ? "" : ` of ${list.stratum}`;
  const where = (position: number): string => `draw ${draw.number}, entry ${position}${stratum}`;
  for (const [at, expected] of list.entries.entries()) {
    const entry = found.entries[at];
    const difference = firstDifference([
      () => differ(where(expected.position), entry?.position, expected.position),
      () => differ(`${where(expected.position)}, unit`, entry?.unit, expected.unit),
      () => differ(`${where(expected.position)}, repeats entry`, entry?.repeatOf, expected.repeatOf),
      () => differ(`${where(expected.position)}, is a reserve`, entry?.reserve, expected.reserve),
    ]);
    if (difference !== null) return difference;
  }
  return differ(`draw ${draw.number}, number of entries${stratum}`, found.entries.length, list.entries.length);
}

/** Column, row and label of every entry are those of the unit in the frame's list. */
function compareCells(draw: StoredDraw, frame: RebuiltFrame | undefined): Difference | null {
  const cells = frame?.cells;
  if (cells === undefined || cells === null) return null;
  for (const { entries } of draw.lists) {
    for (const entry of entries) {
      const { column, row } = unitAt(cells, entry.unit);
      const where = `draw ${draw.number}, entry ${entry.position}`;
      const difference = firstDifference([
        () => differ(`${where}, column`, entry.column, column),
        () => differ(`${where}, row`, entry.row, row),
        () => differ(`${where}, label`, entry.label, labelOf(cells, column, row)),
      ]);
      if (difference !== null) return difference;
    }
  }
  return null;
}

function compareEvent(run: ReplayRun, draw: StoredDraw, again: DrawEntries): Difference | null {
  if (run.events.brokenAmong(["draw-made"]) !== null) return null;
  const event = run.events.of("draw-made").find(({ payload }) => payload.drawId === draw.id);
  if (event === undefined) return null; // the order of proof names it
  const { picks, reserves } = event.payload;
  const where = `draw ${draw.number}`;
  // As it was drawn: what lengthened it later has events of its own.
  const drawn = again.flatMap(({ stratum, entries }) =>
    entries
      .slice(0, entries.filter(({ reserve }) => !reserve).length + reserves)
      .map((entry) => ({ stratum, ...entry })),
  );
  return firstDifference([
    () => differ(`${where}, number`, draw.number, event.payload.number),
    () => differ(`${where}, declaration`, draw.declarationId, event.payload.declarationId),
    () => differ(`${where}, picks in its event`, picks, picksOf(again)),
    () => differ(`${where}, hash of its entries in its event`, event.payload.entriesSha256, entriesSha256(drawn)),
    () => differ(`${where}, drawn at`, draw.drawnAt, event.at),
    () => differ(`${where}, drawn by`, draw.member, event.member),
  ]);
}

function picksOf(lists: DrawEntries): number {
  return lists.reduce((sum, { entries }) => sum + entries.filter(({ reserve }) => !reserve).length, 0);
}

const MOST_UNITS_SHOWN = 100;

function listAbandoned(run: ReplayRun, declared: Declared): Check {
  const id = `declaration-${declared.number}`;
  const title = `Declaration ${declared.number}, abandoned after its seed was known, would have picked these cells`;
  const again = run.lists.get(declared.stored.id) ?? null;
  if (again === null) return notChecked(id, title, "Its declaration or frame is not as it was hashed.");
  if (again instanceof Problem) return notChecked(id, title, `It could not have been drawn. ${again.message}`);
  const units = again.flatMap(({ entries }) => entries.filter(({ reserve }) => !reserve).map(({ unit }) => unit));
  const more = units.length > MOST_UNITS_SHOWN ? " …" : "";
  return passed(id, title, `units ${units.slice(0, MOST_UNITS_SHOWN).join(", ")}${more}`);
}
