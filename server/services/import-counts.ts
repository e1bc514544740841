import type { ColumnChoice } from "#shared/counts/guess-columns.ts";
import { cellCount } from "#shared/counts/in-force.ts";
import type { CountToWrite } from "#shared/counts/match-table.ts";
import type { DateOrder } from "#shared/counts/read-date-text.ts";
import type { Observer, ObserverAnswer } from "#shared/counts/table-observers.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { importsOf, insertImport } from "../db/counts.ts";
import { memberNames } from "../db/members.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { currentSeason, findSurvey, type SeasonRow, type TargetRow, targetsOf } from "../db/surveys.ts";
import type { JudgedCounts } from "../jobs/judge-counts.ts";
import { actingMember } from "./acting-member.ts";
import { keepFirstCount } from "./enter-counts.ts";
import { inWords, type Said } from "./keep-entry.ts";
import { newId } from "./new-id.ts";
import { newUuid } from "./new-uuid.ts";
import { listVisits, seasonInUse, type VisitView } from "./read-visits.ts";
import { recordEvent } from "./record-event.ts";

interface Wanted {
  readonly targetId: string;
  /** Columns that a person chose; guessed where nobody did. */
  readonly columns?: { readonly [C in keyof ColumnChoice]?: number | undefined } | undefined;
  readonly zeroWords: readonly string[];
  readonly dateOrder?: DateOrder | undefined;
  readonly observers?: readonly ObserverAnswer[] | undefined;
  /** null judges only; the hash of the file that was judged writes. */
  readonly write: string | null;
}

interface TableFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

/** A table judged row by row, and whether it was written. */
export interface ImportView {
  readonly judged: JudgedCounts;
  readonly written: boolean;
  /** When the same bytes were imported before. */
  readonly importedBefore: string | null;
}

/** What a table is judged against, as it stood when the reading began. */
interface Seen {
  readonly target: TargetRow;
  readonly drawId: string;
  readonly visits: readonly VisitView[];
  readonly members: readonly Observer[];
  readonly season: SeasonRow;
  readonly timeZone: string;
}

/**
 * Judges a table of counts row by row, in a worker; writes what is new and clear when asked to, all rows or none, and only
 * of the file that was judged. Nothing that is here already is written over.
 * @throws Problem `changed-meanwhile` where the draw or a count of a cell to write changed while the table was read.
 */
export async function importCounts(
  ctx: Context,
  file: TableFile,
  wanted: Wanted,
  signal: AbortSignal,
): Promise<ImportView> {
  const seen = see(ctx, wanted);
  const judged = await ctx.jobs.run("judge-counts", taskOf(ctx, file, wanted, seen), signal);
  if (wanted.write !== null && wanted.write !== judged.fileSha256) {
    throw new Problem("table-changed", "Nothing was written. Look at the rows of this file first, then write them.");
  }
  const before = importsOf(ctx.db, ctx.surveyId).find((row) => row.sha256 === judged.fileSha256);
  const view = { judged, importedBefore: before?.importedAt ?? null };
  if (wanted.write === null || judged.toWrite.length === 0) return { ...view, written: false };
  writeTx(ctx.db, (tx) => {
    expectUnchanged(tx, ctx, seen, judged.toWrite);
    writeRows(tx, ctx, file, wanted, judged, seen);
  });
  return { ...view, written: true };
}

function see(ctx: Context, { targetId, observers = [] }: Wanted): Seen {
  const target = targetsOf(ctx.db, ctx.surveyId).find((row) => row.id === targetId);
  if (!target) throw new Problem("count-invalid", "This survey does not count that target. Choose one of its targets.");
  const { season, visits } = listVisits(ctx);
  if (!season.live || visits.length === 0) {
    throw new Problem("draw-missing", "Draw cells first: a table is matched to the drawn cells.");
  }
  const members = [...memberNames(ctx.db, ctx.surveyId)].map(([id, name]) => ({ id, name }));
  const stranger = observers.find((answer) => "member" in answer && members.every(({ id }) => id !== answer.member));
  if (stranger) {
    throw new Problem(
      "count-invalid",
      `“${stranger.written}” was given to somebody who is no member of this survey. Choose a member, or keep the name.`,
    );
  }
  return {
    target,
    drawId: season.live.draw.id,
    visits,
    members,
    season: currentSeason(ctx.db, ctx.surveyId),
    timeZone: findSurvey(ctx.db, ctx.surveyId)?.timeZone ?? "UTC",
  };
}

function taskOf(ctx: Context, { bytes }: TableFile, wanted: Wanted, seen: Seen) {
  const { target, visits, members, season, timeZone } = seen;
  const chosen = Object.entries(wanted.columns ?? {}).filter(([, column]) => column !== undefined);
  return {
    bytes,
    columns: Object.fromEntries(chosen) as Partial<ColumnChoice>,
    cells: visits.map(({ visit, label, orders }) => ({ unit: visit.unit, label, orders, openedAt: visit.openedAt })),
    existing: new Map(visits.flatMap(({ visit, count }) => (count ? [[visit.unit, cellCount(count)] as const] : []))),
    rules: { wholeNumbers: target.wholeNumbers, zeroWords: wanted.zeroWords },
    targetWords: [target.plural, target.singular],
    dates: {
      timeZone,
      now: ctx.now().toISOString(),
      seasonStartsOn: season.startsOn,
      seasonEndsOn: season.endsOn,
      order: wanted.dateOrder,
    },
    members,
    observers: wanted.observers ?? [],
  };
}

/** Holds what the verdict rested on against what is there now: the live draw, and no count of the cells to write. */
function expectUnchanged(tx: Tx, ctx: Context, seen: Seen, toWrite: readonly CountToWrite[]): void {
  const { live, counts } = seasonInUse(tx, ctx.surveyId);
  if (live?.draw.id !== seen.drawId) {
    throw new Problem(
      "changed-meanwhile",
      "Nothing was written: the draw was withdrawn while the table was read. Read the table again and look at its rows.",
    );
  }
  const visitIds = new Map(seen.visits.map(({ visit }) => [visit.unit, visit.id]));
  for (const { unit, label } of toWrite) {
    const count = counts.get(visitIds.get(unit) ?? "");
    if (!count) continue;
    throw new Problem(
      "changed-meanwhile",
      `Nothing was written: cell ${label} was given a count meanwhile, ${inWords(count)}. Read the table again and look at its rows.`,
    );
  }
}

function writeRows(
  tx: Tx,
  ctx: Context,
  file: TableFile,
  { observers = [] }: Wanted,
  { fileSha256, toWrite, columns, dateOrder, merged }: JudgedCounts,
  { target, visits }: Seen,
): void {
  const memberId = actingMember(ctx);
  const at = ctx.now().toISOString();
  const importId = newId(ctx);
  const visitIds = new Map(visits.map(({ visit }) => [visit.unit, visit.id]));
  const written = toWrite.length;
  insertImport(tx, {
    id: importId,
    surveyId: ctx.surveyId,
    fileName: file.name,
    sha256: fileSha256,
    columns: { ...columns, dateOrder, observers },
    written,
    importedBy: memberId,
    importedAt: at,
  });
  for (const row of toWrite) {
    const visitId = visitIds.get(row.unit);
    if (visitId === undefined) throw new Error(`unit ${row.unit} has no visit`);
    const observerId = row.observer.kind === "member" ? row.observer.member : memberId;
    const made = { madeAt: row.madeAt ?? at, observerId };
    const count = { id: newUuid(ctx), visitId, targetId: target.id, said: said(row), note: row.note, ...made };
    keepFirstCount(tx, ctx, count, importId);
  }
  recordEvent(tx, ctx, {
    surveyId: ctx.surveyId,
    at,
    memberId,
    kind: "counts-imported",
    payload: { version: 2, importId, fileName: file.name, fileSha256, written, dateOrder, merged: [...merged] },
  });
}

function said({ count }: CountToWrite): Said {
  return count.state === "counted" ? { state: count.state, value: count.value } : { state: count.state };
}
