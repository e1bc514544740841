/** About 50 000 passwords that are tried first, in lower case. */
let list: Promise<ReadonlySet<string>> | undefined;

/** Read when a password is set for the first time: the list takes a tenth of a second. */
async function commonPasswords(): Promise<ReadonlySet<string>> {
  list ??= import("@zxcvbn-ts/language-common").then(
    ({ dictionary }) => new Set(dictionary["passwords-common"].map((word) => word.toLowerCase())),
  );
  return list;
}

/** Digits at the end that are thought of as an addition: a year, a date, a telephone's last figures. */
const MOST_DIGITS_ADDED = 8;

/** Marks at the end that are thought of as an addition. */
const MARKS_ADDED = /[!?.,*#$@+_-]{1,3}$/;

/** A unit this short is common however often it is said again. */
const SHORT_UNIT = 3;

/**
 * Whether a password is one of the first that are tried: one of the list or of the person's own words, in any case, also said
 * twice or more, also with up to eight digits and three marks added at its end. A common word within a sentence is fine.
 */
export async function isCommonPassword(password: string, ownWords: readonly string[]): Promise<boolean> {
  const common = await commonPasswords();
  const own = new Set(ownWords.map((word) => word.trim().toLowerCase()).filter((word) => word !== ""));
  const known = (word: string) => common.has(word) || own.has(word);
  return withoutAdditions(password.trim().toLowerCase()).some((word) => known(word) || isRepetition(word, known));
}

/** The password itself, and what is left without marks and without one to eight digits at its end. */
function withoutAdditions(password: string): string[] {
  const bare = password.replace(MARKS_ADDED, "");
  const words = new Set([password, bare]);
  const digits = /\d*$/.exec(bare)?.[0].length ?? 0;
  for (let cut = 1; cut <= Math.min(digits, MOST_DIGITS_ADDED); cut += 1) {
    const rest = bare.slice(0, -cut);
    words.add(rest);
    words.add(rest.replace(MARKS_ADDED, ""));
  }
  words.delete("");
  return [...words];
}

/** Whether a word is a shorter one said twice or more, and that one is known or very short. */
function isRepetition(word: string, known: (unit: string) => boolean): boolean {
  for (let length = 1; length <= word.length / 2; length += 1) {
    const unit = word.slice(0, length);
    if (word.length % length !== 0 || unit.repeat(word.length / length) !== word) continue;
    if (length <= SHORT_UNIT || known(unit)) return true;
  }
  return false;
}
