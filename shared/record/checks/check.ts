import type { AreaFile } from "#shared/exchange/read-area.ts";
import type { Readers } from "#shared/exchange/read-file.ts";
import type { EpsgLookup } from "#shared/projection/crs.ts";
import type { RecordFile } from "#shared/record/record-file.ts";
import type { Repeated } from "./draws-repeated.ts";
import type { RebuiltFrame } from "./frame-rebuilt.ts";
import type { RecordEvents } from "./record-events.ts";

export type Outcome = "passed" | "failed" | "not-checked";

/** The first place where the record and the replay part. Texts as people read them. */
export interface Difference {
  readonly where: string;
  /** What the record says. */
  readonly found: string;
  /** What the replay gets. */
  readonly expected: string;
}

export interface Check {
  readonly id: string;
  /** What is shown when it passes, as a fact. */
  readonly title: string;
  readonly outcome: Outcome;
  /** In words: what was compared, or the first difference and what next. */
  readonly detail: string;
  readonly difference: Difference | null;
}

/** What the auditor holds beside the record. */
export interface ReplayGiven extends Readers {
  /** Hashes from mails, sheets and exports; spaces in them are passed over. */
  readonly heldHashes?: readonly string[] | undefined;
  /** Fingerprint of the installation's key, as given at invitation. */
  readonly fingerprint?: string | undefined;
  readonly sourceFile?: AreaFile | undefined;
  /** The list of systems, for a boundary file in one that is not built in. */
  readonly epsg?: EpsgLookup | undefined;
}

/** Told which check is at work and how far the replay is; what it throws ends the replay. */
export type ReplayProgress = (done: number, of: number, what: string) => void;

/** What the checks share. */
export interface ReplayRun {
  readonly record: RecordFile;
  readonly given: ReplayGiven;
  readonly events: RecordEvents;
  /** By frame id. */
  readonly frames: ReadonlyMap<string, RebuiltFrame>;
  /** Every list again, by declaration id. */
  readonly lists: ReadonlyMap<string, Repeated>;
  /** Called now and then by long checks; throws when the replay is cancelled. */
  readonly tell: () => void;
}

export function passed(id: string, title: string, detail: string): Check {
  return { id, title, outcome: "passed", detail, difference: null };
}

export function notChecked(id: string, title: string, detail: string): Check {
  return { id, title, outcome: "not-checked", detail, difference: null };
}

/** A check that failed at its first difference; `next` says what it may mean or what to do. */
export function failed(id: string, title: string, difference: Difference, next = ""): Check {
  const { where, found, expected } = difference;
  const detail = `${where}: the record says ${found}; expected ${expected}.${next === "" ? "" : ` ${next}`}`;
  return { id, title, outcome: "failed", detail, difference };
}

/** Passes when there is no difference. */
export function verdict(id: string, title: string, difference: Difference | null, detail: string): Check {
  return difference === null ? passed(id, title, detail) : failed(id, title, difference);
}

/** The first of several comparisons that finds something, each made only when those before found nothing. */
export function firstDifference(comparisons: Iterable<() => Difference | null>): Difference | null {
  for (const compare of comparisons) {
    const difference = compare();
    if (difference !== null) return difference;
  }
  return null;
}

/** A difference where two plain values are not the same. */
export function differ(where: string, found: unknown, expected: unknown): Difference | null {
  return Object.is(found, expected) ? null : { where, found: shown(found), expected: shown(expected) };
}

/** The first member, in the order of `expected`, whose value is not the same. */
export function differInMembers(
  where: string,
  found: Readonly<Record<string, unknown>>,
  expected: Readonly<Record<string, unknown>>,
): Difference | null {
  return firstDifference(
    Object.keys(expected).map((name) => () => differ(`${where}, ${name}`, found[name], expected[name])),
  );
}

/** A value as a sentence holds it: texts between straight quotes, hashes short, nothing as "nothing". */
export function shown(value: unknown): string {
  if (value === undefined || value === null) return "nothing";
  if (typeof value === "string") return /^[0-9a-f]{64}$/.test(value) ? shortHash(value) : `"${value}"`;
  return JSON.stringify(value);
}

export function shortHash(hash: string): string {
  return `${hash.slice(0, 8)}…${hash.slice(-4)}`;
}

/** "1 draw", "2 draws". */
export function counted(n: number, one: string, many = `${one}s`): string {
  return `${n} ${n === 1 ? one : many}`;
}
