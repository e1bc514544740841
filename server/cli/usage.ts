import { parseArgs, type ParseArgsConfig } from "node:util";

/** The command was called in a way that it doesn't have: exit status 2. */
export class UsageError extends Error {
  constructor(message: string) {
    super(message);
    this.name = "UsageError";
  }
}

/** A value that later versions know. */
export function notInThisVersion(option: string): UsageError {
  return new UsageError(`${option}: not in this version.`);
}

type Options = NonNullable<ParseArgsConfig["options"]>;
type Parsed<T extends Options> = ReturnType<
  typeof parseArgs<{ args: string[]; options: T; allowPositionals: boolean; strict: true }>
>;

/** node:util parseArgs, whose complaints are wrong usage. */
export function options<T extends Options>(args: readonly string[], known: T, positionals: number): Parsed<T> {
  try {
    const parsed = parseArgs({
      args: withNegativeValues(args),
      options: known,
      allowPositionals: positionals > 0,
      strict: true,
    });
    if (parsed.positionals.length > positionals) throw new UsageError(`What is "${parsed.positionals.at(-1) ?? ""}"?`);
    return parsed;
  } catch (error) {
    if (error instanceof UsageError) throw error;
    const [line = ""] = (error as Error).message.split(/\n|\. To specify/);
    throw new UsageError(line);
  }
}

/** "--origin -30,10" as "--origin=-30,10": a value may begin with a minus and a digit. */
function withNegativeValues(args: readonly string[]): string[] {
  const joined: string[] = [];
  for (const arg of args) {
    const before = joined.at(-1);
    if (/^-\d/.test(arg) && before !== undefined && /^--[a-z-]+$/.test(before))
      joined[joined.length - 1] = `${before}=${arg}`;
    else joined.push(arg);
  }
  return joined;
}

export function needed(value: string | undefined, option: string): string {
  if (value === undefined || value === "") throw new UsageError(`${option} is needed.`);
  return value;
}

/** One of a few words; `later` are words that a later version knows. */
export function oneOf<T extends string>(
  value: string,
  option: string,
  known: readonly T[],
  later: readonly string[] = [],
): T {
  const found = known.find((word) => word === value);
  if (found !== undefined) return found;
  if (later.includes(value)) throw notInThisVersion(`${option} ${value}`);
  throw new UsageError(`${option} is one of ${known.join(", ")}; got "${value}".`);
}

export function wholeNumber(value: string, option: string): number {
  if (!/^\d{1,15}$/.test(value)) throw new UsageError(`${option} is a whole number; got "${value}".`);
  return Number(value);
}

/**
 * A decimal text as a whole number of its smallest steps: "12.5" with 3 places is 12500. Exact: nothing is rounded, and
 * what has more places is wrong usage.
 */
export function decimalSteps(value: string, option: string, places: number): number {
  const match = /^(-?)(\d{1,12})(?:\.(\d+))?$/.exec(value.trim());
  const fraction = (match?.[3] ?? "").replace(/0+$/, "");
  if (match === null || fraction.length > places) {
    throw new UsageError(`${option} is a number with at most ${places} decimal places; got "${value}".`);
  }
  const steps = Number(`${match[2] ?? ""}${fraction.padEnd(places, "0")}`);
  return match[1] === "-" && steps !== 0 ? -steps : steps;
}

/** One line on stderr, whatever line breaks the text has. */
export function sayError(text: string): void {
  process.stderr.write(`${text.replace(/\s*\n\s*/g, " ")}\n`);
}

/** A result on stdout. */
export function printJson(value: unknown): void {
  process.stdout.write(`${JSON.stringify(value, null, 2)}\n`);
}
