import type { CountEntry, ImportVerdict, TableQuestion } from "#shared/api/counts.ts";
import type { TableQuestion as JudgedQuestion } from "#shared/counts/match-table.ts";
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

export function presentImport({ judged, written, importedBefore }: ImportView): ImportVerdict {
  return {
    fileSha256: judged.fileSha256,
    header: [...judged.header],
    firstRows: judged.firstRows.map((row) => [...row]),
    columns: judged.columns,
    notes: [...judged.notes],
    questions: judged.questions.map(presentQuestion),
    dateOrder: judged.dateOrder,
    rows: judged.rows.map(({ row, verdict, message, cell, said, day, by, flag }) => ({
      ...{ row, verdict, message, cell, said, day, by, flag },
    })),
    numbers: { ...judged.numbers },
    notInTable: [...judged.notInTable],
    toWrite: judged.toWrite.length,
    written,
    importedBefore,
  };
}

function presentQuestion(question: JudgedQuestion): TableQuestion {
  return question.kind === "observer" ? { ...question, candidates: [...question.candidates] } : question;
}
