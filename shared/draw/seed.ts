import { Problem } from "#shared/problem.ts";

const MOST_CODE_POINTS = 200;
/** Below this many characters a reader may well believe that the seed was picked by trying. */
const SHORT_SEED = 10;
const MADE_HERE_DIGITS = 20;

/** Letters, marks, numbers, punctuation, symbols and the plain space U+0020; nothing invisible. */
const ALLOWED = /^[\p{L}\p{M}\p{N}\p{P}\p{S} ]$/u;

/** The invisible characters that people paste most, by the names they know. */
const NAMES = new Map<number, string>([
  [0x09, "a tab"],
  [0x0a, "a line break"],
  [0x0d, "a line break"],
  [0x85, "a line break"],
  [0xa0, "a no-break space"],
  [0xad, "a soft hyphen"],
  [0x200b, "a zero-width space"],
  [0x200c, "a zero-width non-joiner"],
  [0x200d, "a zero-width joiner"],
  [0x202f, "a narrow no-break space"],
  [0x2028, "a line separator"],
  [0x2029, "a paragraph separator"],
  [0x2060, "a word joiner"],
  [0x3000, "an ideographic space"],
  [0xfeff, "a byte order mark"],
]);

function nameOf(character: string): string {
  const code = character.codePointAt(0) ?? 0;
  const point = `U+${code.toString(16).toUpperCase().padStart(4, "0")}`;
  const name = NAMES.get(code) ?? (/\p{Zs}/u.test(character) ? "another kind of space" : "an invisible character");
  return `${name} (${point})`;
}

const withoutOuterSpaces = (text: string): string => text.replace(/^ +| +$/g, "");

/**
 * The seed as it is used and stored: text in Unicode NFC without outer U+0020, 1 to 200 code points of the categories
 * L, M, N, P, S and U+0020. Leading zeros and inner spaces stay. Anything else is refused, never removed, because
 * two people must see the same text and draw the same cells.
 * @throws Problem `seed-invalid` that names the character and its place (code points from 1 in the text as typed).
 */
export function checkSeed(text: string): string {
  let place = 0;
  for (const character of text) {
    place += 1;
    if (!ALLOWED.test(character)) {
      throw new Problem(
        "seed-invalid",
        `Character ${place} of the seed is ${nameOf(character)}, which cannot be seen. Type the seed without it.`,
      );
    }
  }
  const seed = withoutOuterSpaces(text.normalize("NFC"));
  const length = Array.from(seed).length;
  if (length === 0) throw new Problem("seed-invalid", "The seed is empty. Type at least one character.");
  if (length > MOST_CODE_POINTS) {
    throw new Problem("seed-invalid", `The seed has ${length} characters. Use at most ${MOST_CODE_POINTS}.`);
  }
  return seed;
}

/**
 * What to tell about a seed as it was typed: what was changed in it, and what a reader may doubt. Every note is about a
 * seed that `checkSeed` accepts.
 */
export function seedNotes(text: string): string[] {
  const seed = checkSeed(text);
  const notes: string[] = [];
  const composed = text.normalize("NFC");
  if (composed !== text) notes.push("Letters typed as a letter and a separate mark were joined (Unicode NFC).");
  if (withoutOuterSpaces(composed) !== composed) notes.push("Spaces before and after the seed were removed.");
  if (/^0\d*$/.test(seed)) notes.push("The leading zeros belong to the seed: it is text, not a number.");
  if (Array.from(seed).length < SHORT_SEED) {
    notes.push(
      "This seed is short: a reader may think that several were tried. Twenty digits from dice leave no doubt.",
    );
  }
  return notes;
}

/** The seed between straight quotes, so that its first and last character can be seen. */
export const quotedSeed = (seed: string): string => `"${seed}"`;

/**
 * A seed made here: 20 decimal digits, each from one call of `randomBelow(10)`, which must give 0 … 9 with equal chances
 * from a cryptographic source.
 */
export function madeHereSeed(randomBelow: (m: number) => number): string {
  return Array.from({ length: MADE_HERE_DIGITS }, () => {
    const digit = randomBelow(10);
    if (!Number.isInteger(digit) || digit < 0 || digit > 9) throw new RangeError(`not a digit: ${digit}`);
    return String(digit);
  }).join("");
}
