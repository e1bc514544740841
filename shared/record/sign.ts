import { ed25519 } from "@noble/curves/ed25519.js";
import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, hexToBytes } from "@noble/hashes/utils.js";

/** Ed25519 (RFC 8032) over the 32 bytes of an envelope's hash; keys and signatures in lower-case hexadecimal. */
export function signHash(hashHex: string, secretKeyHex: string): string {
  return bytesToHex(ed25519.sign(hexToBytes(hashHex), hexToBytes(secretKeyHex)));
}

/** False for a signature by another key, over another hash, or malformed. */
export function signatureHolds(hashHex: string, signatureHex: string, publicKeyHex: string): boolean {
  try {
    return ed25519.verify(hexToBytes(signatureHex), hexToBytes(hashHex), hexToBytes(publicKeyHex));
  } catch {
    return false;
  }
}

export function publicKeyOf(secretKeyHex: string): string {
  return bytesToHex(ed25519.getPublicKey(hexToBytes(secretKeyHex)));
}

/** What auditors are given at invitation: SHA-256 of the 32 bytes of the public key. */
export function keyFingerprint(publicKeyHex: string): string {
  return bytesToHex(sha256(hexToBytes(publicKeyHex)));
}
