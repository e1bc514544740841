/**
 * Numbers as people read them, on screen, in sentences and in methods statements: written here and nowhere else.
 * U+202F parts thousands; U+00A0 stands before a unit or a per cent sign; U+2212 is the minus.
 */
const THOUSANDS = "\u202f";
const MINUS = "\u2212";
export const BEFORE_UNIT = "\u00a0";

/**
 * A number with fixed decimals, thousands parted from 1 000 up, a true minus. Minus zero loses its sign.
 * @throws RangeError where it is not finite.
 */
export function numberText(value: number, decimals = 0): string {
  if (!Number.isFinite(value)) throw new RangeError(`cannot write ${value} as a number`);
  const fixed = Math.abs(value).toFixed(decimals);
  const [whole = "", fraction] = fixed.split(".");
  const parted = whole.replaceAll(/\B(?=(\d{3})+$)/g, THOUSANDS);
  const sign = value < 0 && /[1-9]/.test(fixed) ? MINUS : "";
  return `${sign}${parted}${fraction === undefined ? "" : `.${fraction}`}`;
}

/** The power of ten of a number's first figure: 599 has 2, 0.0808 has −2. Exact, as a logarithm is not. */
export function magnitudeOf(value: number): number {
  return Number(value.toExponential().split("e")[1]);
}

/** A number rounded to so many significant figures, zeros at the end kept: 2 925.7 with 3 is 2 930, 0.8 with 2 is 0.80. */
export function significantText(value: number, figures: number): string {
  if (!Number.isInteger(figures) || figures < 1) throw new RangeError(`needs at least one figure, got ${figures}`);
  if (value === 0) return "0";
  const rounded = Number(value.toPrecision(figures));
  return numberText(rounded, Math.min(100, Math.max(0, figures - 1 - magnitudeOf(rounded))));
}

/** A number with so many significant figures at most, zeros at the end dropped: 3.5, 2 925.67. */
export function figuresText(value: number, figures: number): string {
  const text = significantText(value, figures);
  return text.includes(".") ? text.replace(/\.?0+$/, "") : text;
}

/** "A", "A and B", "A, B and C". */
export function listText(words: readonly string[]): string {
  return words.length < 2 ? (words[0] ?? "") : `${words.slice(0, -1).join(", ")} and ${words.at(-1) ?? ""}`;
}

/** "1 pick", "60 picks". */
export function countText(value: number, one: string, many = `${one}s`): string {
  return `${numberText(value)} ${value === 1 ? one : many}`;
}
