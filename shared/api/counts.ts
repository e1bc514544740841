import * as z from "zod/mini";
import { id, none, reason, sha256Hex, surveyParams, utc, uuid } from "#shared/api/common.ts";
import { contract, json } from "#shared/api/contract.ts";
import { visit, visitState } from "#shared/api/field.ts";
import { LONGEST_NAME } from "#shared/counts/table-observers.ts";

const value = z.number().check(z.minimum(0), z.maximum(1e12));
const note = z.string().check(z.trim(), z.maxLength(2000));

/** What somebody says of a cell: a number when it was counted, a state when it was not. */
export const statement = z.discriminatedUnion("state", [
  z.object({ state: z.literal("counted"), value }),
  z.object({ state: z.enum(["not-in-population", "refused", "unsafe", "not-reached", "lost"]) }),
]);

export const countEntry = z.object({
  id: uuid,
  visitId: id,
  targetId: id,
  purpose: z.enum(["first", "recount", "pass", "other-observer"]),
  state: visitState,
  value: z.nullable(z.number()),
  observer: z.string(),
  enteredBy: z.string(),
  note: z.string(),
  replaces: z.nullable(uuid),
  reason: z.string(),
  /** When the count was made, by whoever made it; and when it reached the server. */
  madeAt: utc,
  enteredAt: utc,
});
export type CountEntry = z.infer<typeof countEntry>;

export const enterCounts = contract({
  name: "enterCounts",
  method: "POST",
  path: "/api/surveys/:surveyId/counts",
  guard: "counts.enter",
  summary: "Write down counts; an entry that is sent twice is kept once",
  params: surveyParams,
  query: none,
  body: z.object({
    entries: z
      .array(
        z.object({
          id: uuid,
          visitId: id,
          targetId: id,
          said: statement,
          note,
          madeAt: utc,
        }),
      )
      .check(z.minLength(1), z.maxLength(500)),
  }),
  answer: json(z.object({ visits: z.array(visit) })),
});

export const amendCount = contract({
  name: "amendCount",
  method: "POST",
  path: "/api/surveys/:surveyId/visits/:visitId/amendments",
  guard: "counts.amend",
  summary: "Replace the count in force; the old value stays, with who, when and why",
  params: z.object({ surveyId: id, visitId: id }),
  query: none,
  body: z.object({ id: uuid, targetId: id, replaces: uuid, said: statement, note, reason, madeAt: utc }),
  answer: json(visit),
});

export const listEntries = contract({
  name: "listEntries",
  method: "GET",
  path: "/api/surveys/:surveyId/visits/:visitId/entries",
  guard: "counts.enter",
  summary: "All that was ever written down for one cell, oldest first",
  params: z.object({ surveyId: id, visitId: id }),
  query: none,
  body: none,
  answer: json(z.object({ entries: z.array(countEntry) })),
});

/** Which column of the table holds what; −1 where there is none. */
export const tableColumns = z.object({
  unit: z.int(),
  label: z.int(),
  count: z.int(),
  state: z.int(),
  note: z.int(),
  observer: z.int(),
  date: z.int(),
});

/** Which of two numbers comes first in dates such as 03/04/2031. */
export const dateOrder = z.enum(["day-first", "month-first"]);

const nameInFile = z.string().check(z.maxLength(LONGEST_NAME));

/** A name in the file is a member's; or it stays a name in the notes, spelled so. */
export const observerAnswer = z.union([
  z.object({ written: nameInFile, member: id }),
  z.object({ written: nameInFile, name: nameInFile }),
]);

export const rowVerdict = z.object({
  /** Line of the table, the first data row being 1. */
  row: z.int(),
  verdict: z.enum(["new", "same", "different", "not-drawn", "empty", "question", "refused"]),
  message: z.string(),
  cell: z.string(),
  said: z.string(),
  /** The day of the count on the clocks of the place, as it was read ("2031-05-03"); empty where the row tells none. */
  day: z.string(),
  /** Who counted: a member's name, or one that stays in the note; empty where the row tells none. */
  by: z.string(),
  /** What to look at although the row is good; empty for most. */
  flag: z.string(),
});

/** Asked once a file, once a word or once a name; no row that waits for an answer is written. */
export const tableQuestion = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("zero-word"), word: z.string(), rows: z.int() }),
  z.object({
    kind: z.literal("date-order"),
    why: z.string(),
    /** One of the dates, and the day that it would be either way. */
    written: z.string(),
    dayFirst: z.string(),
    monthFirst: z.string(),
    rows: z.int(),
  }),
  z.object({
    kind: z.literal("observer"),
    written: z.string(),
    rows: z.int(),
    candidates: z.array(
      z.discriminatedUnion("kind", [
        z.object({ kind: z.literal("member"), member: id, name: z.string() }),
        z.object({ kind: z.literal("spelling"), name: z.string() }),
      ]),
    ),
  }),
]);
export type TableQuestion = z.infer<typeof tableQuestion>;

export const importVerdict = z.object({
  fileSha256: sha256Hex,
  header: z.array(z.string()),
  firstRows: z.array(z.array(z.string())),
  columns: tableColumns,
  notes: z.array(z.string()),
  questions: z.array(tableQuestion),
  /** The order by which dates were read; null where none needed it or it is asked. */
  dateOrder: z.nullable(dateOrder),
  /** At most 5,000 rows of the table, those first that are written, asked about or refused. */
  rows: z.array(rowVerdict),
  /** How many rows have each verdict, of all. */
  numbers: z.record(rowVerdict.shape.verdict, z.int()),
  /** Drawn cells that the table doesn't name: not yet counted, never zero. */
  notInTable: z.array(z.string()),
  toWrite: z.int(),
  written: z.boolean(),
  /** The same bytes were imported before. */
  importedBefore: z.nullable(utc),
});
export type ImportVerdict = z.infer<typeof importVerdict>;

export const importCounts = contract({
  name: "importCounts",
  method: "POST",
  path: "/api/surveys/:surveyId/count-imports",
  guard: "counts.import",
  summary: "Judge a table of counts row by row; write it only when asked to, and only what was judged",
  params: surveyParams,
  query: none,
  body: z.object({
    targetId: id,
    /** Columns that a person chose; what is left out is guessed. */
    columns: z.optional(z.partial(tableColumns)),
    /** Texts such as "nil" that the reader has said mean zero. */
    zeroWords: z.array(z.string().check(z.maxLength(40))).check(z.maxLength(20)),
    /** The answer to the question of that kind. */
    dateOrder: z.optional(dateOrder),
    /** Answers to the questions about names. */
    observers: z.optional(z.array(observerAnswer).check(z.maxLength(1000))),
    /** null judges; the hash that was judged writes. */
    write: z.nullable(sha256Hex),
  }),
  upload: { field: "file", maxBytes: 10_000_000 },
  answer: json(importVerdict),
});
