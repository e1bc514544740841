/** A text as part of a file's name: letters and digits in lower case, the rest as hyphens. */
export function fileNamePart(text: string): string {
  const part = text
    .replace(/[^\p{L}\p{N}]+/gu, "-")
    .replace(/^-+|-+$/g, "")
    .toLowerCase();
  return part === "" ? "survey" : part;
}
