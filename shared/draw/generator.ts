import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";
import seedrandom from "seedrandom";
import { Problem } from "#shared/problem.ts";

/** The generators a declaration may name. Both can be repeated outside this program. */
export const GENERATORS = ["sha256-counter", "arc4"] as const;
export type GeneratorName = (typeof GENERATORS)[number];

/** A stream of whole numbers: the k-th call of `next(m)` gives the stream's k-th number in 0 … m − 1. */
export interface Generator {
  readonly name: GeneratorName;
  next(m: number): number;
}

/** Up to here a remainder below m, shifted by 16 bits, plus 16 bits, is exact in a double. */
const EXACT_BY_HALF_WORDS = 0x20_0000_0000; // 2³⁷
/** The arc4 generator's values have 52 bits after the binary point. */
const ARC4_LIMIT = 0x10_0000_0000_0000; // 2⁵²

function checkModulus(m: number): void {
  if (!Number.isSafeInteger(m) || m < 1) throw new RangeError(`next(m) needs a whole number m of at least 1, got ${m}`);
}

/**
 * The text that a stream is made from (rule R6): `quillet-draw/1|frameSha256|seed|stratum`.
 * The seed is one that `checkSeed` returned; without strata the stratum is the empty text.
 * @throws RangeError where the frame's hash is not 64 lower-case hexadecimal digits.
 */
export function streamText(frameSha256: string, seed: string, stratum: string): string {
  if (!/^[0-9a-f]{64}$/.test(frameSha256)) throw new RangeError(`not a SHA-256 in lower-case hex: "${frameSha256}"`);
  return `quillet-draw/1|${frameSha256}|${seed}|${stratum}`;
}

/**
 * Remainder of a 256-bit big-endian whole number by m. Whole numbers only: sixteen bits at a time where every
 * step stays below 2⁵³, else by BigInt.
 */
export function remainderOf(digest: Uint8Array, m: number): number {
  if (m > EXACT_BY_HALF_WORDS) return Number(BigInt(`0x${bytesToHex(digest)}`) % BigInt(m));
  let remainder = 0;
  for (let i = 0; i + 1 < digest.length; i += 2) {
    remainder = (remainder * 65_536 + (digest[i] ?? 0) * 256 + (digest[i + 1] ?? 0)) % m;
  }
  return remainder;
}

/**
 * `sha256-counter`, the default: number k is the SHA-256 of the UTF-8 text `quillet-draw/1|frameSha256|seed|stratum|k`
 * as a big-endian whole number, modulo m. The bias is below m / 2²⁵⁶. The hash's state after the part before k is kept
 * and cloned, so that a call hashes one block as a rule.
 */
export function sha256Counter(frameSha256: string, seed: string, stratum: string): Generator {
  const afterPrefix = sha256.create().update(utf8ToBytes(`${streamText(frameSha256, seed, stratum)}|`));
  const scratch = afterPrefix.clone();
  const digest = new Uint8Array(32);
  let calls = 0;
  return {
    name: "sha256-counter",
    next(m) {
      checkModulus(m);
      calls += 1;
      afterPrefix
        ._cloneInto(scratch)
        .update(utf8ToBytes(String(calls)))
        .digestInto(digest);
      return remainderOf(digest, m);
    },
  };
}

/**
 * `arc4`: the default generator of the `seedrandom` package, seeded with the lower-case hexadecimal SHA-256 of the
 * UTF-8 text `quillet-draw/1|frameSha256|seed|stratum` (hashed first, because that generator's key is cyclic: "42" and
 * "4242" give it one stream); number k is ⌊value × m⌋.
 * @throws Problem `design-invalid` for m ≥ 2⁵²: its values have 52 bits.
 */
export function arc4(frameSha256: string, seed: string, stratum: string): Generator {
  const value = seedrandom(bytesToHex(sha256(utf8ToBytes(streamText(frameSha256, seed, stratum)))));
  return {
    name: "arc4",
    next(m) {
      checkModulus(m);
      if (m >= ARC4_LIMIT) {
        throw new Problem(
          "design-invalid",
          `The generator arc4 cannot choose among ${m} numbers. Choose sha256-counter.`,
        );
      }
      return Math.floor(value() * m);
    },
  };
}

/** The generator of that name at the start of a stratum's stream. */
export function generatorNamed(name: GeneratorName, frameSha256: string, seed: string, stratum: string): Generator {
  switch (name) {
    case "sha256-counter":
      return sha256Counter(frameSha256, seed, stratum);
    case "arc4":
      return arc4(frameSha256, seed, stratum);
  }
}
