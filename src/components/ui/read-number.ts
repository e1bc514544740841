/**
 * The number that a person typed, or null where the text is none. Spaces of any width may part thousands; a point or a comma is the
 * decimal sign (the comma only where there is no point, and only one); a minus may be U+2212. "1,5" is 1.5; "1,500.5" and "1e3" are
 * no numbers here: the first is doubtful, the second nobody types in a field.
 */
export function readNumber(text: string): number | null {
  const plain = text.trim().replaceAll("\u2212", "-");
  if (!/^[+-]?\d{1,3}([\u0020\u00a0\u2009\u202f]\d{3})+([.,]\d+)?$|^[+-]?\d+([.,]\d*)?$|^[+-]?[.,]\d+$/.test(plain))
    return null;
  return Number(plain.replaceAll(/[\u0020\u00a0\u2009\u202f]/g, "").replace(",", "."));
}
