import type * as z from "zod/mini";
import type { importCounts, ImportVerdict, observerAnswer, TableQuestion } from "#shared/api/counts.ts";

export type Columns = ImportVerdict["columns"];
export type DateOrder = NonNullable<ImportVerdict["dateOrder"]>;
export type ObserverAnswer = z.output<typeof observerAnswer>;

/** All that a person has said of a table, and what they were asked: an answer can be changed until it is written. */
export interface ImportChoice {
  readonly columns: Columns | null;
  readonly zeroWords: readonly string[];
  readonly dateOrder: DateOrder | null;
  readonly observers: readonly ObserverAnswer[];
  readonly asked: readonly TableQuestion[];
}

export const NOTHING_SAID: ImportChoice = { columns: null, zeroWords: [], dateOrder: null, observers: [], asked: [] };

type Body = z.input<typeof importCounts.body>;

export function bodyOf(
  { columns, zeroWords, dateOrder, observers }: ImportChoice,
  targetId: string,
): Omit<Body, "write"> {
  return {
    targetId,
    zeroWords: [...zeroWords],
    observers: [...observers],
    ...(columns !== null && { columns }),
    ...(dateOrder !== null && { dateOrder }),
  };
}

/** Other columns: questions about those that changed are no longer the same, and fall away with their answers. */
export function withColumns(choice: ImportChoice, before: Columns, columns: Columns): ImportChoice {
  const gone = new Set<TableQuestion["kind"]>();
  if (columns.count !== before.count) gone.add("zero-word");
  if (columns.date !== before.date) gone.add("date-order");
  if (columns.observer !== before.observer) gone.add("observer");
  return {
    columns,
    zeroWords: gone.has("zero-word") ? [] : choice.zeroWords,
    dateOrder: gone.has("date-order") ? null : choice.dateOrder,
    observers: gone.has("observer") ? [] : choice.observers,
    asked: choice.asked.filter(({ kind }) => !gone.has(kind)),
  };
}

/** What a verdict asks, beside what was asked and answered before. */
export function withAsked(choice: ImportChoice, questions: readonly TableQuestion[]): ImportChoice {
  const now = new Map(questions.map((question) => [keyOf(question), question]));
  const before = choice.asked.filter((question) => !now.has(keyOf(question)) && isAnswered(choice, question));
  return { ...choice, asked: [...before, ...questions].toSorted((a, b) => order(a) - order(b)) };
}

export function withObserver(choice: ImportChoice, answer: ObserverAnswer): ImportChoice {
  const others = choice.observers.filter(({ written }) => written !== answer.written);
  return { ...choice, observers: [...others, answer] };
}

export function withZeroWord(choice: ImportChoice, word: string, means: boolean): ImportChoice {
  const others = choice.zeroWords.filter((one) => one !== word);
  return { ...choice, zeroWords: means ? [...others, word] : others };
}

/** One question, however often it is asked. */
export function keyOf(question: TableQuestion): string {
  switch (question.kind) {
    case "zero-word":
      return `zero-word ${question.word}`;
    case "date-order":
      return "date-order";
    case "observer":
      return `observer ${question.written}`;
  }
}

export function isAnswered(choice: ImportChoice, question: TableQuestion): boolean {
  switch (question.kind) {
    case "zero-word":
      return choice.zeroWords.includes(question.word);
    case "date-order":
      return choice.dateOrder !== null;
    case "observer":
      return choice.observers.some(({ written }) => written === question.written);
  }
}

const ORDER: readonly TableQuestion["kind"][] = ["date-order", "observer", "zero-word"];
const order = ({ kind }: TableQuestion): number => ORDER.indexOf(kind);
