import { Problem } from "#shared/problem.ts";

const startsWith = (bytes: Uint8Array, ...start: number[]): boolean => start.every((byte, i) => bytes[i] === byte);

/** Kinds of file that people send in place of a text, by their first bytes. */
function refuseOtherKinds(bytes: Uint8Array): void {
  if (startsWith(bytes, 0x50, 0x4b, 0x03, 0x04)) {
    throw new Problem(
      "table-unreadable",
      "This is a zip file or a spreadsheet's workbook. Save the sheet as CSV and choose that file.",
    );
  }
  if (startsWith(bytes, 0xd0, 0xcf, 0x11, 0xe0)) {
    throw new Problem(
      "table-unreadable",
      "This is an old spreadsheet or text document. Save the sheet as CSV and choose that file.",
    );
  }
  if (startsWith(bytes, 0x25, 0x50, 0x44, 0x46)) {
    throw new Problem("table-unreadable", "This is a PDF. A table in it cannot be read; export the table as CSV.");
  }
}

/** UTF-16 without a mark: in a table of mostly Latin text every second byte is zero. */
function looksLikeUtf16(bytes: Uint8Array): "utf-16le" | "utf-16be" | null {
  const length = Math.min(bytes.length - (bytes.length % 2), 2000);
  if (length < 4) return null;
  let zeroEven = 0;
  let zeroOdd = 0;
  for (let i = 0; i < length; i += 2) {
    if (bytes[i] === 0) zeroEven += 1;
    if (bytes[i + 1] === 0) zeroOdd += 1;
  }
  if (zeroOdd > length / 4 && zeroEven === 0) return "utf-16le";
  if (zeroEven > length / 4 && zeroOdd === 0) return "utf-16be";
  return null;
}

/**
 * The text in a file's bytes: UTF-8 (with or without a byte order mark), UTF-16 of either order, else Windows-1252, which is
 * told because accents and other signs may then be wrong.
 * @throws Problem `table-unreadable` for an empty file, another kind of file, or bytes that are no text.
 */
export function decodeText(bytes: Uint8Array): { value: string; notes: string[] } {
  if (bytes.length === 0) throw new Problem("file-empty", "This file is empty. Nothing was changed.");
  refuseOtherKinds(bytes);
  const decoded = decodeBytes(bytes);
  if (decoded.value.includes("\0")) {
    throw new Problem("table-unreadable", "This file is not a text. Save the table as CSV and choose that file.");
  }
  return decoded;
}

function decodeBytes(bytes: Uint8Array): { value: string; notes: string[] } {
  if (startsWith(bytes, 0xef, 0xbb, 0xbf))
    return { value: decodeUtf8(bytes), notes: ["Read as UTF-8 with a byte order mark."] };
  const utf16 = startsWith(bytes, 0xff, 0xfe)
    ? "utf-16le"
    : startsWith(bytes, 0xfe, 0xff)
      ? "utf-16be"
      : looksLikeUtf16(bytes);
  if (utf16 !== null) {
    return { value: new TextDecoder(utf16).decode(bytes), notes: [`Read as ${utf16.toUpperCase()}.`] };
  }
  try {
    return { value: new TextDecoder("utf-8", { fatal: true }).decode(bytes), notes: [] };
  } catch {
    return {
      value: new TextDecoder("windows-1252").decode(bytes),
      notes: [
        "Not UTF-8: read as Windows-1252 (Latin 1). Check names with accents; if they are wrong, save the file as UTF-8.",
      ],
    };
  }
}

function decodeUtf8(bytes: Uint8Array): string {
  return new TextDecoder("utf-8").decode(bytes);
}
