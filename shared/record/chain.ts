import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";
import canonicalize from "canonicalize";

/**
 * The record's chain (rule R8). Each event has an envelope; the envelope holds the hash of the one before and the hash
 * of its payload, never the payload itself, so that places and names can be left out of a copy and the chain still checks.
 */
export interface Envelope {
  readonly format: "quillet-event/1";
  readonly survey: string;
  /** From 1, no gaps. */
  readonly sequence: number;
  /** UTC, ISO 8601. */
  readonly at: string;
  /** Opaque id of whoever acted. */
  readonly member: string;
  readonly kind: string;
  /** Hash of the envelope before; 64 zeros for the first. */
  readonly previous: string;
  readonly payloadSha256: string;
}

export const BEFORE_THE_FIRST = "0".repeat(64);

/** RFC 8785 (JCS) form of a value. Throws a RangeError on what JSON cannot hold (undefined, NaN, a function). */
export function canonicalText(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new RangeError(`no canonical JSON of ${String(value)}`);
  return text;
}

/** SHA-256 of the RFC 8785 form, in lower-case hexadecimal. */
export function canonicalSha256(value: unknown): string {
  return bytesToHex(sha256(utf8ToBytes(canonicalText(value))));
}

/** Hash of {salt, payload}: the salt keeps short payloads from being guessed. */
export function payloadSha256(salt: string, payload: unknown): string {
  return canonicalSha256({ salt, payload });
}

export function envelopeSha256(envelope: Envelope): string {
  return canonicalSha256(envelope);
}
