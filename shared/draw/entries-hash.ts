import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";

interface EntryOfList {
  readonly stratum: string;
  readonly position: number;
  readonly unit: number;
}

/** SHA-256, lower-case hex, of one line an entry: `stratum,position,unit` and a newline, in stream order, list after list. */
export function entriesSha256(entries: Iterable<EntryOfList>): string {
  const hash = sha256.create();
  for (const { stratum, position, unit } of entries) hash.update(utf8ToBytes(`${stratum},${position},${unit}\n`));
  return bytesToHex(hash.digest());
}
