import type { ReadRow } from "./judge-rows.ts";

/** Somebody of the survey who may have counted. */
export interface Observer {
  readonly id: string;
  readonly name: string;
}

/** What a person has said of a name in the file: it is a member's, or it stays a name, spelled so. */
export type ObserverAnswer =
  { readonly written: string; readonly member: string } | { readonly written: string; readonly name: string };

/** Whom a name in the file may be: a member, or somebody whom the file spells otherwise elsewhere. */
export type ObserverCandidate =
  | { readonly kind: "member"; readonly member: string; readonly name: string }
  | { readonly kind: "spelling"; readonly name: string };

/** Asked once a name. Nothing of its rows is written, and nobody is merged, before a person has answered. */
export interface ObserverQuestion {
  readonly kind: "observer";
  readonly written: string;
  readonly rows: number;
  readonly candidates: readonly ObserverCandidate[];
}

/** Who counted, by a row: a member, a name that stays in the note, or nobody said. */
export type ObserverSaid =
  | { readonly kind: "member"; readonly member: string; readonly name: string }
  | { readonly kind: "name"; readonly name: string }
  | { readonly kind: "nobody" };

export interface ObservedRows {
  readonly rows: readonly ReadRow[];
  readonly observers: ReadonlyMap<number, ObserverSaid>;
  readonly questions: readonly ObserverQuestion[];
  readonly notes: readonly string[];
}

/** Names longer than this are no names: they stay as they are. */
export const LONGEST_NAME = 200;
const MOST_NAMED = 5;
const NOBODY: ObserverSaid = { kind: "nobody" };

/** A name without what people write differently: case, accents, spaces. */
export function plainName(name: string): string {
  return name
    .normalize("NFKD")
    .replaceAll(/\p{M}/gu, "")
    .toLowerCase()
    .replaceAll(/[\s\u200b\u2060\ufeff]+/gu, " ")
    .trim();
}

interface Written {
  readonly written: string;
  readonly plain: string;
  readonly rows: readonly number[];
}

/** Every spelling among the rows that would be written, in the order of the file. */
function spellings(rows: readonly ReadRow[]): Written[] {
  const byName = new Map<string, number[]>();
  for (const row of rows) {
    if (row.observer === "") continue;
    const known = byName.get(row.observer);
    if (known === undefined) byName.set(row.observer, [row.row]);
    else known.push(row.row);
  }
  return [...byName].map(([written, numbers]) => ({ written, plain: plainName(written), rows: numbers }));
}

type Resolved = { readonly said: ObserverSaid } | { readonly asked: ObserverQuestion };

function answered(answer: ObserverAnswer, members: readonly Observer[]): Resolved {
  if ("name" in answer) return { said: { kind: "name", name: answer.name } };
  const member = members.find(({ id }) => id === answer.member);
  if (member === undefined) throw new RangeError(`no member ${answer.member} for “${answer.written}”`);
  return { said: { kind: "member", member: member.id, name: member.name } };
}

/** Who a spelling is: a member by exactly that name, somebody to ask about, or a name that stays in the note. */
function resolve(one: Written, all: readonly Written[], members: readonly Observer[]): Resolved {
  const asIs: Resolved = { said: { kind: "name", name: one.written } };
  if (one.written.length > LONGEST_NAME) return asIs;
  const exact = members.filter(({ name }) => name.normalize("NFC") === one.written.normalize("NFC"));
  const [only] = exact;
  if (only !== undefined && exact.length === 1) {
    return { said: { kind: "member", member: only.id, name: only.name } };
  }
  const alike = exact.length > 1 ? exact : members.filter(({ name }) => plainName(name) === one.plain);
  const ask = (candidates: readonly ObserverCandidate[]): Resolved => ({
    asked: { kind: "observer", written: one.written, rows: one.rows.length, candidates },
  });
  if (alike.length > 0) return ask(alike.map(({ id, name }) => ({ kind: "member", member: id, name })));
  const same = all.filter(({ plain, written }) => plain === one.plain && written.length <= LONGEST_NAME);
  const [leading] = same.toSorted((a, b) => b.rows.length - a.rows.length);
  if (leading === undefined || leading.written === one.written) return asIs;
  return ask([{ kind: "spelling", name: leading.written }]);
}

/**
 * Who counted the rows that would be written. A name that is a member's, character for character, is that member; one that
 * differs from a member's only by case, accents or spaces is proposed, and asked once; so is one that differs only so from a
 * spelling that more rows of the file have (the first in the file, where as many do). Every other name stays in the note.
 * @throws RangeError for an answer that names no member.
 */
export function judgeObservers(
  rows: readonly ReadRow[],
  members: readonly Observer[],
  answers: readonly ObserverAnswer[],
): ObservedRows {
  // Rows that wait for another answer are asked about at once, not in a second round.
  const open = rows.filter(({ verdict, kind }) => verdict === "new" || kind === "date-order" || kind === "zero-word");
  const all = spellings(open);
  const saidOf = new Map(answers.map((answer) => [answer.written, answer]));
  const resolved = new Map(
    all.map((one) => {
      const answer = saidOf.get(one.written);
      return [one.written, answer === undefined ? resolve(one, all, members) : answered(answer, members)] as const;
    }),
  );
  const observers = new Map<number, ObserverSaid>();
  const judged = rows.map((row): ReadRow => {
    const who = row.verdict === "new" ? resolved.get(row.observer) : undefined;
    if (who === undefined) return row;
    if ("said" in who) {
      observers.set(row.row, who.said);
      return row;
    }
    const names = who.asked.candidates.map(({ name }) => `“${name}”`).join(" or ");
    return { ...row, verdict: "question", kind: "observer", message: `Is “${row.observer}” ${names}?` };
  });
  const questions = [...resolved.values()].flatMap((who) => ("asked" in who ? [who.asked] : []));
  return { rows: judged, observers, questions, notes: notesOf([...resolved.values()]) };
}

export const observerOf = (observed: ObservedRows, row: number): ObserverSaid => observed.observers.get(row) ?? NOBODY;

function notesOf(resolved: readonly Resolved[]): string[] {
  const names = new Set(
    resolved.flatMap((who) => ("said" in who && who.said.kind === "name" ? [who.said.name.trim()] : [])),
  );
  if (names.size === 0) return [];
  const listed = [...names].slice(0, MOST_NAMED).join(", ");
  const more = names.size > MOST_NAMED ? ` and ${names.size - MOST_NAMED} more` : "";
  const are =
    names.size === 1
      ? "No member of the survey has this name, so it stays"
      : "No members of the survey have these names, so they stay";
  return [`${are} in the notes: ${listed}${more}.`];
}
