import type { CountEntry, ImportVerdict } from "#shared/api/counts.ts";
import type { ImportView } from "../services/import-counts.ts";
import type { EntriesView } from "../services/list-entries.ts";

export function presentEntries({ entries, names }: EntriesView): CountEntry[] {
  return entries.map((row) => ({
    id: row.id,
    visitId: row.visitId,
    targetId: row.targetId,
    purpose: row.purpose,
    state: row.state,
    value: row.value,
    observer: names.get(row.observerId) ?? "somebody",
    enteredBy: names.get(row.enteredBy) ?? "somebody",
    note: row.note,
    replaces: row.replaces,
    reason: row.reason,
    madeAt: row.madeAt,
    enteredAt: row.enteredAt,
  }));
}

const ROWS_SHOWN = 3;

export function presentImport(view: ImportView): ImportVerdict {
  const { columns, rows, notInTable, toWrite, notes } = view.verdict;
  const { unit, label, count, state, note } = columns;
  return {
    fileSha256: view.fileSha256,
    header: [...view.table.header],
    firstRows: view.table.rows.slice(0, ROWS_SHOWN).map((row) => [...row]),
    columns: { unit, label, count, state, note },
    notes: [...view.notes, ...notes],
    rows: rows.map(({ row, verdict, message, cell, said, flag }) => ({ row, verdict, message, cell, said, flag })),
    notInTable: notInTable.map((cell) => cell.label),
    toWrite: toWrite.length,
    written: view.written,
    importedBefore: view.importedBefore,
  };
}
