const DIGIT = /\p{Nd}/u;

/**
 * Digits of any script as 0–9, with their decimal and thousands signs (Arabic ٫ and ٬). Unicode keeps each script's digits
 * in runs of ten from zero up, so the distance from the run's beginning, modulo ten, is the value.
 */
export function westernDigits(text: string): string {
  return Array.from(text, (character) => {
    if (character === "٫") return ".";
    if (character === "٬") return ",";
    const code = character.codePointAt(0) ?? 0;
    if (code < 128 || !DIGIT.test(character)) return character;
    let first = code;
    while (DIGIT.test(String.fromCodePoint(first - 1))) first -= 1;
    return String((code - first) % 10);
  }).join("");
}
