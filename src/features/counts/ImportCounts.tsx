import { useState } from "react";
import type { ImportVerdict } from "#shared/api/counts.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { Checkbox } from "../../components/ui/Checkbox.tsx";
import { FileDrop } from "../../components/ui/FileDrop.tsx";
import { formatCount, formatList } from "../../components/ui/format.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { ColumnChoice, type Columns } from "./ColumnChoice.tsx";
import { useImportCounts } from "./queries.ts";
import { VerdictTable } from "./VerdictTable.tsx";

interface ImportCountsProps {
  readonly surveyId: string;
  readonly targetId: string;
}

/** A table of counts: its columns matched, each row judged, and only then written, all or nothing. */
export function ImportCounts({ surveyId, targetId }: ImportCountsProps) {
  const [file, setFile] = useState<File | null>(null);
  const [zeroWords, setZeroWords] = useState<readonly string[]>([]);
  const judge = useImportCounts(surveyId);
  const write = useImportCounts(surveyId);
  const verdict = write.data ?? judge.data;
  const ask = (next: File, columns: Columns | null, words: readonly string[]) => {
    write.reset();
    judge.mutate({
      file: next,
      body: { targetId, zeroWords: [...words], write: null, ...(columns !== null && { columns }) },
    });
  };
  const send = (judged: ImportVerdict) => {
    if (file === null) return;
    write.mutate(
      { file, body: { targetId, columns: judged.columns, zeroWords: [...zeroWords], write: judged.fileSha256 } },
      { onSuccess: (done) => showToast(`${formatCount(done.toWrite, "count")} written from ${file.name}.`) },
    );
  };
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
        busy={judge.isPending}
        onFile={(next) => {
          setFile(next);
          setZeroWords([]);
          ask(next, null, []);
        }}
      />
      {judge.isError && <Refusal error={judge.error} />}
      {file !== null && verdict !== undefined && (
        <div className="mt-4 grid gap-4">
          <Told verdict={verdict} />
          {!verdict.written && (
            <>
              <ColumnChoice verdict={verdict} onColumns={(columns) => ask(file, columns, zeroWords)} />
              <ZeroWords
                verdict={verdict}
                chosen={zeroWords}
                onChosen={(words) => {
                  setZeroWords(words);
                  ask(file, verdict.columns, words);
                }}
              />
            </>
          )}
          <VerdictTable verdict={verdict} />
          {write.isError && <Refusal error={write.error} />}
          {!verdict.written && verdict.toWrite > 0 && (
            <div>
              <Button variant="primary" busy={write.isPending} busyLabel="Writing…" onClick={() => send(verdict)}>
                {`Write ${formatCount(verdict.toWrite, "count")}`}
              </Button>
            </div>
          )}
        </div>
      )}
    </Section>
  );
}

function Told({ verdict }: { readonly verdict: ImportVerdict }) {
  const times = useTimes();
  return (
    <>
      {verdict.written && (
        <Banner title={`${formatCount(verdict.toWrite, "count is", "counts are")} written.`}>
          Rows that were not taken stay as they are in your file.
        </Banner>
      )}
      {verdict.importedBefore !== null && !verdict.written && (
        <Banner title={`The same file was read in ${times.time(verdict.importedBefore)}.`}>
          What it holds is there already; only rows that are new would be written.
        </Banner>
      )}
      {verdict.notes.map((note) => (
        <p key={note} className="q-help">
          {note}
        </p>
      ))}
      {verdict.notInTable.length > 0 && (
        <p>
          {`${formatCount(verdict.notInTable.length, "drawn cell is", "drawn cells are")} not in the table: not yet counted, not zero. ${formatList(verdict.notInTable.slice(0, 8))}${verdict.notInTable.length > 8 ? " …" : ""}`}
        </p>
      )}
    </>
  );
}

interface ZeroWordsProps {
  readonly verdict: ImportVerdict;
  readonly chosen: readonly string[];
  readonly onChosen: (words: readonly string[]) => void;
}

/** Words such as "nil" mean zero only when a person says so. */
function ZeroWords({ verdict, chosen, onChosen }: ZeroWordsProps) {
  const asked = verdict.rows
    .filter((row) => row.verdict === "question" && !/\d/.test(row.said))
    .map((row) => row.said.trim().toLowerCase());
  const words = [...new Set([...asked, ...chosen])].filter((word) => word !== "" && word.length <= 40).slice(0, 20);
  if (words.length === 0) return null;
  return (
    <fieldset className="q-fieldset">
      <legend className="q-label">Which of these mean: searched, none found?</legend>
      {words.map((word) => (
        <Checkbox
          key={word}
          label={`“${word}” means 0`}
          checked={chosen.includes(word)}
          onChange={(event) =>
            onChosen(event.target.checked ? [...chosen, word] : chosen.filter((one) => one !== word))
          }
        />
      ))}
    </fieldset>
  );
}
