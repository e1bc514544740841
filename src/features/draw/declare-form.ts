import { type Design, designNotes, checkDesign, reserveDefault } from "#shared/draw/design.ts";
import { readLevel } from "#shared/estimate/level.ts";
import { Problem } from "#shared/problem.ts";
import { formatNumber } from "../../components/ui/format.ts";
import { readNumber } from "../../components/ui/read-number.ts";
import type { NewDeclaration } from "./queries.ts";

/** What the planner typed, as typed. */
export interface DeclareTexts {
  readonly kind: Design["kind"];
  readonly n: string;
  /** Empty: the usual number for n. */
  readonly reserves: string;
  readonly generator: NewDeclaration["generator"];
  readonly limits: NewDeclaration["limits"];
  readonly level: string;
  readonly seedSource: NewDeclaration["seedSource"];
  readonly note: string;
}

/** As a declaration holds it: "0." and six decimals. */
const LONGEST_LEVEL = 8;
const LONGEST_NOTE = 2000;

export const FIRST_TEXTS: DeclareTexts = {
  kind: "srs-wr",
  n: "",
  reserves: "",
  generator: "sha256-counter",
  limits: "log-normal",
  level: "95",
  seedSource: "made-here",
  note: "",
};

interface Errors {
  n?: string;
  reserves?: string;
  level?: string;
  note?: string;
}

export interface DeclareReading {
  readonly errors: Readonly<Errors>;
  /** Said beside what can be declared all the same. */
  readonly notes: readonly string[];
  /** What would be declared; null while something is missing or wrong. */
  readonly body: NewDeclaration | null;
}

interface Ground {
  readonly frameId: string;
  readonly units: number;
  readonly reasonNeeded: boolean;
}

/** The number of reserves that an empty field stands for. */
export function usualReserves(texts: DeclareTexts, units: number): number | null {
  const n = wholeNumber(texts.n);
  if (n === null) return null;
  return reserveDefault(n, texts.kind === "srs-wor" ? Math.max(0, units - n) : undefined);
}

/** Reads the form: errors by field, notes, and the declaration when it can be made. */
export function readDeclareForm(texts: DeclareTexts, ground: Ground): DeclareReading {
  const n = wholeNumber(texts.n);
  const reserves = texts.reserves.trim() === "" ? usualReserves(texts, ground.units) : wholeNumber(texts.reserves);
  const level = levelOf(texts.level);
  const errors: Errors = {};
  if (n === null || n < 1)
    errors.n =
      texts.n.trim() === ""
        ? "Say how many picks: at least 2 for a standard error."
        : `“${texts.n}” is no number of picks. Use a whole number, such as 60.`;
  if (texts.reserves.trim() !== "" && reserves === null)
    errors.reserves = `“${texts.reserves}” is no number of reserves. Use a whole number, or leave it empty.`;
  if (level instanceof Problem) errors.level = level.message;
  if (ground.reasonNeeded && texts.note.trim().length < 3)
    errors.note = "Say why there is a new draw: it stands in the declaration.";
  if (texts.note.trim().length > LONGEST_NOTE)
    errors.note = `Use at most ${formatNumber(LONGEST_NOTE)} characters: these are ${formatNumber(texts.note.trim().length)}.`;
  if (n === null || reserves === null || level instanceof Problem || errors.n !== undefined)
    return { errors, notes: [], body: null };
  const design: Design = { kind: texts.kind, n };
  const refused = refusalOf(() => checkDesign(design, ground.units, reserves));
  if (refused !== null) {
    const field = refusalOf(() => checkDesign(design, ground.units, 0)) === null ? "reserves" : "n";
    return { errors: { ...errors, [field]: refused.message }, notes: [], body: null };
  }
  const { generator, limits, seedSource, note } = texts;
  const body = { frameId: ground.frameId, design, generator, reserves, limits, level, seedSource, note: note.trim() };
  return { errors, notes: designNotes(design, ground.units), body: Object.keys(errors).length > 0 ? null : body };
}

function wholeNumber(text: string): number | null {
  const value = readNumber(text);
  return value === null || !Number.isInteger(value) || value < 0 ? null : value;
}

/** "95", "95 %" and "0.95" alike, as decimal text, or why it is none. */
function levelOf(text: string): string | Problem {
  let level = "";
  const refused = refusalOf(() => {
    level = String(readLevel(text));
  });
  if (refused !== null) return refused;
  return level.length <= LONGEST_LEVEL
    ? level
    : new Problem("input-invalid", `“${text}” is finer than a level is kept. Use at most four decimals of a per cent.`);
}

function refusalOf(check: () => unknown): Problem | null {
  try {
    check();
    return null;
  } catch (error) {
    if (error instanceof Problem) return error;
    throw error;
  }
}
