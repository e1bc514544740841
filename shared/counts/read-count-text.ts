import { MOST_COUNTED, type CountState } from "./count.ts";
import { westernDigits } from "./digits.ts";
import { plainWords, readStateText } from "./read-state-text.ts";

/** Why a text can't be taken for a count. Each kind has one sentence, and is told with its number of rows. */
export type RefusedKind =
  | "negative"
  | "bound"
  | "range"
  | "approximate"
  | "doubtful"
  | "sum"
  | "uncounted-many"
  | "date"
  | "too-large"
  | "no-number";

/** What only a person can settle. */
export type QuestionKind = "zero-word" | "fraction" | "comma";

export type CountReading =
  | { readonly kind: "value"; readonly value: number }
  /** A state written where a number was looked for: "refused". */
  | { readonly kind: "state"; readonly state: Exclude<CountState, "counted"> }
  /** No count in here: not yet counted, never zero. `sign` is what stood for it, empty where nothing did. */
  | { readonly kind: "empty"; readonly sign: string }
  | { readonly kind: "question"; readonly ask: QuestionKind; readonly message: string; readonly ifYes: number }
  | { readonly kind: "refused"; readonly why: RefusedKind; readonly message: string };

export interface CountRules {
  /** The target is counted in whole numbers, so that a fraction is asked about. */
  readonly wholeNumbers?: boolean;
  /** Words that a person has said mean zero, such as "nil". */
  readonly zeroWords?: readonly string[];
  /** A person has said that fractions are meant. */
  readonly fractionsMeant?: boolean;
}

/** What says "nothing is written here". */
const PLACEHOLDERS = new Set([
  "-",
  "--",
  "---",
  "–",
  "—",
  "−",
  ".",
  "..",
  "…",
  "/",
  "n/a",
  "na",
  "n.a.",
  "n.a",
  "#n/a",
]);
/** What may say zero, or may say that nobody looked. */
const ZERO_WORDS = new Set(["nil", "none", "nothing", "null", "absent", "ø", "none seen", "none found", "nil found"]);
const MANY =
  /^(?:tntc|t\.n\.t\.c\.?|too (?:many|numerous)(?: to count)?|many|lots|numerous|several|few|some|present|\++|x+)$/;

const LONGEST = 60;

const SPACES = "[ \\u00a0\\u2000-\\u200a\\u202f\\u3000'’]";
const DASH = "[-\\u2010-\\u2015\\u2212]";
const NUMBER = "\\d[\\d.,]*";
const GROUPED = new RegExp(`^\\d{1,3}(?:${SPACES}\\d{3})+(?:[.,]\\d+)?$`);
const RANGE = new RegExp(`^${NUMBER}\\s*(?:${DASH}|to|\\.\\.+|/|or|bis|à)\\s*${NUMBER}$`);
const BOUND = new RegExp(
  `^(?:[<>≤≥]=?|=[<>]|at least|at most|over|under|more than|less than|up to|min\\.?|max\\.?|minimum|maximum)\\s*${NUMBER}$|^${NUMBER}\\s*(?:\\+|[<>]|or more|or less|plus)$`,
);
const APPROXIMATE = new RegExp(
  `^(?:c\\.?|ca\\.?|circa|~|≈|about|approx\\.?|approximately|around|est\\.?|estimated|roughly)\\s*${NUMBER}$|^${NUMBER}\\s*(?:approx\\.?|est\\.?|±.*|ish)$`,
);
const DOUBTFUL = new RegExp(`^\\(?\\?+\\s*${NUMBER}\\)?$|^\\(?${NUMBER}\\s*\\(?\\?+\\)?$|^\\?+$`);
const SUM = new RegExp(`^${NUMBER}(?:\\s*[+&*x×]\\s*${NUMBER})+$`);
const NEGATIVE = new RegExp(`^${DASH}\\s*${NUMBER}$`);
const MONTH = "(?:jan|feb|mar|apr|may|jun|jul|aug|sep|oct|nov|dec)[a-z]*";
const DATE = new RegExp(
  `^\\d{1,4}[-./ ]${MONTH}(?:[-./ ]\\d{2,4})?$|^${MONTH}[-./ ]\\d{1,4}$|^\\d{1,4}[-./]\\d{1,2}[-./]\\d{1,4}$|^\\d{1,2}:\\d{2}`,
);

const REFUSALS: readonly { readonly why: RefusedKind; readonly pattern: RegExp; readonly message: string }[] = [
  { why: "negative", pattern: NEGATIVE, message: "A count is zero or more. Look at the sheet." },
  { why: "date", pattern: DATE, message: "This looks like a date. Enter the number." },
  { why: "bound", pattern: BOUND, message: "A bound is no count. Enter the number, or count again." },
  { why: "range", pattern: RANGE, message: "A range is no count. Enter the number, or count again." },
  { why: "approximate", pattern: APPROXIMATE, message: "A guess is no count. Enter the number that was counted." },
  {
    why: "doubtful",
    pattern: DOUBTFUL,
    message: "The number is in doubt. Enter it without the mark once it is settled.",
  },
  { why: "sum", pattern: SUM, message: "Two numbers are written. Enter what was counted in the whole cell." },
  {
    why: "uncounted-many",
    pattern: MANY,
    message: "This says that there were some, not how many. Enter the number, or give a state.",
  },
];

function refused(why: RefusedKind, message: string): CountReading {
  return { kind: "refused", why, message };
}

/** A number as written, or undefined where the text is none; "comma" where a comma may be decimals or thousands. */
function readNumber(text: string): number | "comma" | undefined {
  const joined = GROUPED.test(text) ? text.replaceAll(new RegExp(SPACES, "g"), "") : text;
  if (/^\+?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d{1,3})?$/.test(joined)) return Number(joined);
  if (/^[1-9]\d{0,2},\d{3}$/.test(joined)) return "comma";
  if (/^\d*,\d+$/.test(joined)) return Number(joined.replace(",", "."));
  if (/^\d{1,3}(?:,\d{3})+(?:\.\d+)?$/.test(joined)) return Number(joined.replaceAll(",", ""));
  if (/^\d{1,3}(?:\.\d{3})+,\d+$/.test(joined) || /^\d{1,3}(?:\.\d{3}){2,}$/.test(joined)) {
    return Number(joined.replaceAll(".", "").replace(",", "."));
  }
  return undefined;
}

function judgeNumber(value: number, rules: CountRules): CountReading {
  if (value > MOST_COUNTED) return refused("too-large", "This number is too large for a count. Look at the sheet.");
  if (rules.wholeNumbers === true && rules.fractionsMeant !== true && !Number.isInteger(value)) {
    const message = `${value} is no whole number. Is half an object meant, or is it a slip?`;
    return { kind: "question", ask: "fraction", message, ifYes: value };
  }
  return { kind: "value", value };
}

function readWord(text: string, words: string, rules: CountRules): CountReading | undefined {
  if (words === "zero") return { kind: "value", value: 0 };
  const zeroWords = new Set((rules.zeroWords ?? []).map(plainWords));
  if (zeroWords.has(words)) return { kind: "value", value: 0 };
  if (ZERO_WORDS.has(words)) {
    const message = `Is “${text}” a zero: searched, none found?`;
    return { kind: "question", ask: "zero-word", message, ifYes: 0 };
  }
  const state = readStateText(text);
  return state === "unknown" || state === "counted" ? undefined : { kind: "state", state };
}

/**
 * What a text, typed or imported, says about a count. Numbers in any digits are read, with spaces between thousands, a decimal
 * comma where it can be nothing else, and exponents. Empty and placeholder texts are no count. A word such as "nil" is a
 * question, never a silent zero; bounds, ranges, guesses, doubts, sums and negative numbers are refused by kind.
 */
export function readCountText(given: string, rules: CountRules = {}): CountReading {
  const text = westernDigits(given.normalize("NFC"))
    .replaceAll(/[\u200b-\u200f\u2060\ufeff]/g, "")
    .trim();
  const lower = text.toLowerCase();
  if (text.length > LONGEST) return refused("no-number", "This text is too long for a count. Enter the number.");
  if (text === "" || PLACEHOLDERS.has(lower)) return { kind: "empty", sign: text };
  const number = readNumber(lower);
  if (number === "comma") {
    const ifYes = Number(text.replace(",", ""));
    return { kind: "question", ask: "comma", message: `Is ${text} a number of thousands, ${ifYes}?`, ifYes };
  }
  if (number !== undefined) return judgeNumber(number, rules);
  const word = readWord(text, plainWords(text), rules);
  if (word !== undefined) return word;
  const known = REFUSALS.find(({ pattern }) => pattern.test(lower));
  if (known !== undefined) return refused(known.why, known.message);
  return refused("no-number", `“${text.slice(0, 40)}” is no number. Enter the number, or give a state.`);
}
