import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex } from "@noble/hashes/utils.js";
import { type ColumnChoice, guessColumns } from "#shared/counts/guess-columns.ts";
import { cellCount } from "#shared/counts/in-force.ts";
import { type CountToWrite, matchTable, type TableVerdict } from "#shared/counts/match-table.ts";
import { type CsvTable, readCsv } from "#shared/exchange/csv.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { importsOf, insertImport } from "../db/counts.ts";
import { appendEvent } from "../db/events.ts";
import { type Reader, type Tx, writeTx } from "../db/open.ts";
import { type TargetRow, targetsOf } from "../db/surveys.ts";
import { actingMember } from "./acting-member.ts";
import { keepFirstCount } from "./enter-counts.ts";
import type { Said } from "./keep-entry.ts";
import { newId } from "./new-id.ts";
import { newUuid } from "./new-uuid.ts";
import { listVisits, type VisitView } from "./read-visits.ts";

interface Wanted {
  readonly targetId: string;
  /** Columns that a person chose; guessed where nobody did. */
  readonly columns?: Partial<ColumnChoice> | undefined;
  readonly zeroWords: readonly string[];
  /** null judges only; the hash of the file that was judged writes. */
  readonly write: string | null;
}

interface TableFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

/** A table judged row by row, and whether it was written. */
export interface ImportView {
  readonly fileSha256: string;
  readonly table: CsvTable;
  readonly notes: readonly string[];
  readonly verdict: TableVerdict;
  readonly written: boolean;
  /** When the same bytes were imported before. */
  readonly importedBefore: string | null;
}

const LONGEST_NOTE = 2000;

/**
 * Judges a table of counts row by row; writes what is new and clear when asked to, all rows or none, and only of the file
 * that was judged. Nothing that is here already is written over.
 */
export function importCounts(ctx: Context, file: TableFile, wanted: Wanted): ImportView {
  const { value: table, notes } = readCsv(file.bytes);
  const fileSha256 = bytesToHex(sha256(file.bytes));
  if (wanted.write !== null && wanted.write !== fileSha256) {
    throw new Problem("table-changed", "Nothing was written. Look at the rows of this file first, then write them.");
  }
  const judged = (reader: Reader) => {
    const importedBefore = importsOf(reader, ctx.surveyId).find((row) => row.sha256 === fileSha256)?.importedAt ?? null;
    return { ...judge(ctx, reader, table, wanted), importedBefore };
  };
  if (wanted.write === null) return { fileSha256, table, notes, ...judged(ctx.db), written: false };
  return writeTx(ctx.db, (tx) => {
    const { visits, ...view } = judged(tx);
    const written = view.verdict.toWrite.length > 0;
    if (written) writeRows(tx, ctx, { ...file, sha256: fileSha256 }, wanted.targetId, view.verdict, visits);
    return { fileSha256, table, notes, ...view, written };
  });
}

interface Judged {
  readonly verdict: TableVerdict;
  readonly visits: readonly VisitView[];
}

function judge(ctx: Context, reader: Reader, table: CsvTable, wanted: Wanted): Judged {
  const target = targetHere(reader, ctx.surveyId, wanted.targetId);
  const { visits } = listVisits(ctx, reader);
  if (visits.length === 0)
    throw new Problem("draw-missing", "Draw cells first: a table is matched to the drawn cells.");
  const cells = visits.map(({ visit, label, orders }) => ({ unit: visit.unit, label, orders }));
  const targetWords = [target.plural, target.singular];
  const known = { units: new Set(cells.map((c) => c.unit)), labels: new Set(cells.map((c) => c.label.toUpperCase())) };
  const verdict = matchTable({
    header: table.header,
    rows: table.rows,
    columns: { ...guessColumns(table.header, table.rows, known, targetWords), ...wanted.columns },
    cells,
    existing: new Map(visits.flatMap(({ visit, count }) => (count ? [[visit.unit, cellCount(count)]] : []))),
    rules: { wholeNumbers: target.wholeNumbers, zeroWords: wanted.zeroWords },
    targetWords,
  });
  return { verdict, visits };
}

function targetHere(reader: Reader, surveyId: string, targetId: string): TargetRow {
  const target = targetsOf(reader, surveyId).find((row) => row.id === targetId);
  if (!target) throw new Problem("count-invalid", "This survey does not count that target. Choose one of its targets.");
  return target;
}

function writeRows(
  tx: Tx,
  ctx: Context,
  file: TableFile & { readonly sha256: string },
  targetId: string,
  { toWrite, columns }: TableVerdict,
  visits: readonly VisitView[],
): void {
  const memberId = actingMember(ctx);
  const at = ctx.now().toISOString();
  const importId = newId(ctx);
  const visitIds = new Map(visits.map(({ visit }) => [visit.unit, visit.id]));
  insertImport(tx, {
    id: importId,
    surveyId: ctx.surveyId,
    fileName: file.name,
    sha256: file.sha256,
    columns,
    written: toWrite.length,
    importedBy: memberId,
    importedAt: at,
  });
  for (const row of toWrite) {
    const visitId = visitIds.get(row.unit);
    if (visitId === undefined) throw new Error(`unit ${row.unit} has no visit`);
    keepFirstCount(
      tx,
      ctx,
      { id: newUuid(ctx), visitId, targetId, said: said(row), note: noteOf(row), madeAt: at },
      importId,
    );
  }
  appendEvent(tx, ctx, {
    surveyId: ctx.surveyId,
    at,
    memberId,
    kind: "counts-imported",
    payload: { version: 1, importId, fileName: file.name, fileSha256: file.sha256, written: toWrite.length },
  });
}

function said({ count }: CountToWrite): Said {
  return count.state === "counted" ? { state: count.state, value: count.value } : { state: count.state };
}

/** The row's note, and its observer and date as they were written: the file's names and dates are not ours to interpret. */
function noteOf({ note, observer, date }: CountToWrite): string {
  const parts = [note, observer === "" ? "" : `counted by ${observer}`, date === "" ? "" : `on ${date}`];
  return parts
    .filter((part) => part !== "")
    .join("; ")
    .slice(0, LONGEST_NOTE);
}
