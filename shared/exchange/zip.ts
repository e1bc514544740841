import { strFromU8, unzipSync } from "fflate";
import { Problem } from "#shared/problem.ts";

/** One file of an archive, as the archive's directory lists it. */
export interface ZipEntry {
  readonly name: string;
  /** What the directory says; unpacking checks it. */
  readonly size: number;
  readonly crc32: number;
}

const MAX_ENTRIES = 10_000;
/** All files of an archive together, unpacked. */
export const MAX_UNPACKED_BYTES = 60_000_000;

const END_OF_DIRECTORY = 0x06054b50;
const DIRECTORY_ENTRY = 0x02014b50;
const ENCRYPTED = 1;
const UTF8_NAME = 1 << 11;

/**
 * The files of a zip archive by its directory, without unpacking anything; folders and the leftovers of file managers
 * (`__MACOSX`, `.DS_Store`, `Thumbs.db`) are not listed.
 * @throws Problem file-damaged without a directory; file-unsafe with too many files, encrypted ones, or more than 60 MB in all.
 */
export function listZip(bytes: Uint8Array): ZipEntry[] {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const end = endOfDirectory(view);
  const count = view.getUint16(end + 10, true);
  let at = view.getUint32(end + 16, true);
  if (count === 0xffff || at === 0xffffffff) throw tooLarge("more files or bytes than a plain zip archive can list");
  if (count > MAX_ENTRIES) throw tooLarge(`${count} files`);
  const entries: ZipEntry[] = [];
  let total = 0;
  for (let i = 0; i < count; i++) {
    if (at + 46 > end || view.getUint32(at, true) !== DIRECTORY_ENTRY) throw damaged("its directory breaks off");
    const flags = view.getUint16(at + 8, true);
    const nameLength = view.getUint16(at + 28, true);
    const name = strFromU8(bytes.subarray(at + 46, at + 46 + nameLength), (flags & UTF8_NAME) === 0);
    const size = view.getUint32(at + 24, true);
    total += size;
    if ((flags & ENCRYPTED) !== 0) {
      throw new Problem(
        "file-unsafe",
        `“${name}” in the archive is encrypted. Make the archive again without a password.`,
      );
    }
    if (!isJunk(name)) entries.push({ name, size, crc32: view.getUint32(at + 16, true) });
    at += 46 + nameLength + view.getUint16(at + 30, true) + view.getUint16(at + 32, true);
  }
  if (total > MAX_UNPACKED_BYTES) throw tooLarge(`${Math.round(total / 1e6)} MB of files`);
  return entries;
}

/**
 * Unpacks one listed file. The sizes that an archive states may lie, so length and checksum are compared afterwards.
 * @throws Problem file-damaged when the file cannot be unpacked, is shorter or longer than stated, or fails its checksum.
 */
export function unzipEntry(bytes: Uint8Array, entry: ZipEntry): Uint8Array {
  let content: Uint8Array | undefined;
  try {
    content = unzipSync(bytes, {
      filter: ({ name, originalSize }) => name === entry.name && originalSize === entry.size,
    })[entry.name];
  } catch {
    throw damaged(`“${entry.name}” cannot be unpacked`);
  }
  if (content === undefined || content.length !== entry.size || crc32(content) !== entry.crc32) {
    throw damaged(`“${entry.name}” is not what the archive's directory says (size or checksum differ)`);
  }
  return content;
}

/** The record at the end of every archive; a comment of up to 65,535 bytes may follow it. */
function endOfDirectory(view: DataView): number {
  const earliest = Math.max(0, view.byteLength - 22 - 65_535);
  for (let at = view.byteLength - 22; at >= earliest; at--) {
    if (view.getUint32(at, true) === END_OF_DIRECTORY) return at;
  }
  throw damaged("it has no directory, so it is cut short or not a zip archive");
}

function isJunk(name: string): boolean {
  const parts = name.split("/");
  const last = parts.at(-1) ?? "";
  return (
    last === "" ||
    parts.includes("__MACOSX") ||
    last.startsWith("._") ||
    last === ".DS_Store" ||
    last.toLowerCase() === "thumbs.db"
  );
}

const CRC_TABLE = Uint32Array.from({ length: 256 }, (_, byte) => {
  let value = byte;
  for (let bit = 0; bit < 8; bit++) value = (value & 1) === 1 ? (value >>> 1) ^ 0xedb88320 : value >>> 1;
  return value;
});

/** The checksum of zip archives (CRC-32, reflected polynomial EDB88320), as an unsigned number. */
export function crc32(bytes: Uint8Array): number {
  let crc = 0xffffffff;
  for (const byte of bytes) crc = (crc >>> 8) ^ (CRC_TABLE[(crc ^ byte) & 0xff] ?? 0);
  return (crc ^ 0xffffffff) >>> 0;
}

const damaged = (what: string): Problem =>
  new Problem("file-damaged", `The zip archive cannot be read: ${what}. Make it again and choose that file.`);

const tooLarge = (what: string): Problem =>
  new Problem(
    "file-unsafe",
    `The archive says that it holds ${what}; at most ${MAX_ENTRIES} files and 60 MB unpacked are read. Put only the boundary's files into it.`,
  );
