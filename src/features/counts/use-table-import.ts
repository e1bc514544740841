import { useState } from "react";
import type { ImportVerdict } from "#shared/api/counts.ts";
import { bodyOf, type ImportChoice, NOTHING_SAID, withAsked } from "./import-choice.ts";
import { useJudgeTable, useWriteTable } from "./queries.ts";

/** A table on its way in: chosen, judged again with each answer, and at last written. What is on the page stays while it is judged. */
export function useTableImport(surveyId: string, targetId: string) {
  const [file, setFile] = useState<File | null>(null);
  const [choice, setChoice] = useState<ImportChoice>(NOTHING_SAID);
  const [verdict, setVerdict] = useState<ImportVerdict | null>(null);
  const judge = useJudgeTable(surveyId);
  const write = useWriteTable(surveyId);
  const ask = (table: File, said: ImportChoice) => {
    setChoice(said);
    write.reset();
    judge.mutate(
      { file: table, body: bodyOf(said, targetId) },
      {
        onSuccess: (judged) => {
          setVerdict(judged);
          setChoice(withAsked(said, judged.questions));
        },
      },
    );
  };
  return {
    file,
    choice,
    verdict,
    judging: judge.isPending,
    writing: write.isPending,
    /** Why the table could not be read, or was not written. */
    refusedReading: judge.error,
    refusedWriting: write.error,
    choose: (next: File) => {
      setFile(next);
      setVerdict(null);
      ask(next, NOTHING_SAID);
    },
    /** With what is said now; without a change it reads the table again. */
    answer: (said: ImportChoice = choice) => {
      if (file !== null) ask(file, said);
    },
    send: (onWritten: (done: ImportVerdict) => void) => {
      if (file === null || verdict === null) return;
      const body = { ...bodyOf(choice, targetId), columns: verdict.columns };
      write.mutate(
        { file, body, judged: verdict.fileSha256 },
        {
          onSuccess: (done) => {
            setVerdict(done);
            onWritten(done);
          },
        },
      );
    },
  };
}
