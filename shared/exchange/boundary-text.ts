import { Problem } from "#shared/problem.ts";

/**
 * The text of a boundary file: UTF-8 or UTF-16 by its byte order mark, else the encoding that an XML declaration names, else
 * UTF-8. The mark is taken off.
 * @throws Problem file-damaged when the bytes are not in that encoding.
 */
export function boundaryText(bytes: Uint8Array): string {
  const [first, second] = bytes;
  if (first === 0xff && second === 0xfe) return decode(bytes, "utf-16le");
  if (first === 0xfe && second === 0xff) return decode(bytes, "utf-16be");
  const start = Array.from(bytes.subarray(0, 200), (byte) => String.fromCharCode(byte)).join("");
  const named = /^(?:ï»¿)?\s*<\?xml[^>]*encoding\s*=\s*["']([A-Za-z0-9._-]+)["']/.exec(start)?.[1];
  return decode(bytes, named ?? "utf-8");
}

function decode(bytes: Uint8Array, encoding: string): string {
  try {
    return new TextDecoder(encoding, { fatal: true }).decode(bytes).replace(/^\uFEFF/, "");
  } catch {
    throw new Problem(
      "file-damaged",
      `The file is not text in ${encoding.toUpperCase()}, as it should be. Save it again as UTF-8.`,
    );
  }
}
