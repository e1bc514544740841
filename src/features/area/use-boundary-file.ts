import { useRef, useState } from "react";
import type { AreaVersion } from "#shared/api/area.ts";
import type { AreaAnswers, AreaQuestion } from "#shared/area/questions.ts";
import type { Problem, ProblemCode } from "#shared/problem.ts";
import { problemOf } from "../../api/problem-of.ts";
import { useImportArea } from "./queries.ts";

/** A file on its way in: it stays chosen with its answers until it is imported or another is taken. */
export interface BoundaryFile {
  readonly file: File | null;
  readonly reading: boolean;
  /** Why the file, or the answer that went out with it, was refused. */
  readonly refusal: Problem | null;
  /** What the file leaves open; it stays until an answer is taken, so that a refused one can be mended. */
  readonly question: AreaQuestion | null;
  readonly take: (file: File) => void;
  readonly answer: (answers: AreaAnswers) => void;
  readonly again: () => void;
  /** Ends the reading of an answer, back to its question; of a file, back to choosing. */
  readonly cancel: () => void;
  readonly leave: () => void;
}

const QUESTION_KINDS: readonly string[] = [
  "crs",
  "layer",
  "lines",
  "axes",
  "place",
] satisfies readonly AreaQuestion["kind"][];

/** Refusals that another answer, or the same once more, may help. */
const OF_THE_ANSWER: readonly ProblemCode[] = [
  "input-invalid",
  "crs-unknown",
  "crs-unsupported",
  "area-size",
  "unreachable",
  "internal",
  "cancelled",
];

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
  const [question, setQuestion] = useState<AreaQuestion | null>(null);
  const importing = useImportArea(surveyId);
  const controller = useRef<AbortController | null>(null);
  const clear = () => {
    setFile(null);
    setAnswers({});
    setQuestion(null);
  };
  const leave = () => {
    controller.current?.abort();
    importing.reset();
    clear();
  };
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
          clear();
          onImported(area);
        },
        onError: (error) => {
          const refused = problemOf(error);
          setQuestion((before) => questionOf(refused) ?? (OF_THE_ANSWER.includes(refused.code) ? before : null));
        },
      },
    );
  };
  const problem = importing.isError ? problemOf(importing.error) : null;
  return {
    file,
    reading: importing.isPending,
    refusal: problem?.code === "cancelled" ? null : problem,
    question,
    take: (chosen) => {
      setQuestion(null);
      send(chosen, {});
    },
    answer: (given) => {
      if (file !== null) send(file, { ...answers, ...given });
    },
    again: () => {
      if (file !== null) send(file, answers);
    },
    cancel: () => {
      if (question === null) leave();
      else controller.current?.abort();
    },
    leave,
  };
}
