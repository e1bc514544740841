import { useRef, useState } from "react";
import type { AreaVersion } from "#shared/api/area.ts";
import type { AreaAnswers, AreaQuestion } from "#shared/area/questions.ts";
import type { Problem } from "#shared/problem.ts";
import { problemOf } from "../../api/problem-of.ts";
import { useImportArea } from "./queries.ts";

/** A file on its way in: it stays chosen with its answers until it is imported or another is taken. */
export interface BoundaryFile {
  readonly file: File | null;
  readonly answers: AreaAnswers;
  readonly reading: boolean;
  /** What was refused, unless it is a question that can be answered here. */
  readonly refusal: Problem | null;
  readonly question: AreaQuestion | null;
  readonly take: (file: File) => void;
  readonly answer: (answers: AreaAnswers) => void;
  readonly again: () => void;
  readonly cancel: () => void;
}

const QUESTION_KINDS: readonly string[] = ["crs", "layer", "axes", "place"] satisfies readonly AreaQuestion["kind"][];

/** The question that rides on a refusal, where it is one of this word. */
function questionOf(problem: Problem): AreaQuestion | null {
  const { question } = problem;
  return question !== undefined && QUESTION_KINDS.includes(question.kind)
    ? (question as unknown as AreaQuestion)
    : null;
}

/** Taking a boundary file in, with the questions that it leaves open. */
export function useBoundaryFile(surveyId: string, onImported: (area: AreaVersion) => void): BoundaryFile {
  const [file, setFile] = useState<File | null>(null);
  const [answers, setAnswers] = useState<AreaAnswers>({});
  const importing = useImportArea(surveyId);
  const controller = useRef<AbortController | null>(null);
  const send = (chosen: File, given: AreaAnswers) => {
    controller.current?.abort();
    const own = new AbortController();
    controller.current = own;
    setFile(chosen);
    setAnswers(given);
    importing.mutate(
      { file: chosen, answers: given, signal: own.signal },
      {
        onSuccess: (area) => {
          setFile(null);
          setAnswers({});
          onImported(area);
        },
      },
    );
  };
  const problem = importing.isError ? problemOf(importing.error) : null;
  const refused = problem?.code === "cancelled" ? null : problem;
  return {
    file,
    answers,
    reading: importing.isPending,
    refusal: refused,
    question: refused === null ? null : questionOf(refused),
    take: (chosen) => send(chosen, {}),
    answer: (given) => {
      if (file !== null) send(file, { ...answers, ...given });
    },
    again: () => {
      if (file !== null) send(file, answers);
    },
    cancel: () => {
      controller.current?.abort();
      importing.reset();
      setFile(null);
      setAnswers({});
    },
  };
}
