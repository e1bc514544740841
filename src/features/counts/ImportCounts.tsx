import type { ImportVerdict } from "#shared/api/counts.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { FileDrop } from "../../components/ui/FileDrop.tsx";
import { formatCount, formatList } from "../../components/ui/format.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { ColumnChoice } from "./ColumnChoice.tsx";
import { withColumns } from "./import-choice.ts";
import { ImportQuestions } from "./ImportQuestions.tsx";
import type { useTableImport } from "./use-table-import.ts";
import { VerdictTable } from "./VerdictTable.tsx";

interface ImportCountsProps {
  readonly table: ReturnType<typeof useTableImport>;
}

/** A table of counts: its columns matched, each row judged, and only then written, all or nothing. */
export function ImportCounts({ table }: ImportCountsProps) {
  const { file, verdict, choice, judging, refusedReading } = table;
  return (
    <Section
      title="Counts from a table"
      lead="CSV, with the unit number or the cell’s label in one column and the count in another. Nothing is written before you have seen how each row is read."
    >
      <FileDrop
        label="Drop the table of counts here"
        help={file === null ? "Comma, semicolon or tab; a spreadsheet’s own CSV is fine." : file.name}
        accept=".csv,.txt,text/csv"
        buttonLabel={file === null ? "Choose a table" : "Choose another"}
        busy={judging}
        onFile={table.choose}
      />
      {refusedReading !== null && (
        <Refusal
          error={refusedReading}
          next={
            <Button size="small" onClick={() => table.answer()}>
              Read it again
            </Button>
          }
        />
      )}
      {verdict !== null && (
        <div className="mt-4 grid gap-4" aria-busy={judging}>
          <Told verdict={verdict} />
          {!verdict.written && (
            <>
              <ColumnChoice
                verdict={verdict}
                columns={choice.columns ?? verdict.columns}
                onColumns={(columns) => table.answer(withColumns(choice, choice.columns ?? verdict.columns, columns))}
              />
              <ImportQuestions choice={choice} onChoice={table.answer} />
            </>
          )}
          <VerdictTable verdict={verdict} />
          <WriteTable table={table} verdict={verdict} />
        </div>
      )}
    </Section>
  );
}

function Told({ verdict }: { readonly verdict: ImportVerdict }) {
  const times = useTimes();
  const { written, importedBefore, notes, notInTable } = verdict;
  return (
    <>
      {written && (
        <Banner title={`${formatCount(verdict.toWrite, "count is", "counts are")} written.`}>
          Rows that were not taken stay as they are in your file.
        </Banner>
      )}
      {importedBefore !== null && !written && (
        <Banner title={`The same file was read in ${times.time(importedBefore)}.`}>
          What it holds is there already; only rows that are new would be written.
        </Banner>
      )}
      {notes.map((note) => (
        <p key={note} className="q-help">
          {note}
        </p>
      ))}
      {notInTable.length > 0 && (
        <p>
          {`${formatCount(notInTable.length, "drawn cell is", "drawn cells are")} not in the table: not yet counted, not zero. ${formatList(notInTable.slice(0, 8))}${notInTable.length > 8 ? " …" : ""}`}
        </p>
      )}
    </>
  );
}

/** The act itself, with what it leaves aside. */
function WriteTable({ table, verdict }: ImportCountsProps & { readonly verdict: ImportVerdict }) {
  const { numbers, toWrite, written } = verdict;
  const waiting =
    numbers.question > 0
      ? `${formatCount(numbers.question, "row waits", "rows wait")} for an answer and stay aside.`
      : "";
  return (
    <>
      {table.refusedWriting !== null && (
        <Refusal
          error={table.refusedWriting}
          next={
            <Button size="small" onClick={() => table.answer()}>
              Read it again
            </Button>
          }
        />
      )}
      {!written && toWrite > 0 && table.refusedReading === null && (
        <div className="flex flex-wrap items-center gap-3">
          <Button
            variant="primary"
            busy={table.writing || table.judging}
            busyLabel={table.writing ? "Writing…" : "Reading…"}
            onClick={() =>
              table.send((done) =>
                showToast(`${formatCount(done.toWrite, "count")} written from ${table.file?.name ?? "the table"}.`),
              )
            }
          >
            {`Write ${formatCount(toWrite, "count")}`}
          </Button>
          <span className="q-help">{`All or none. Each names this file. ${waiting}`.trim()}</span>
        </div>
      )}
    </>
  );
}
