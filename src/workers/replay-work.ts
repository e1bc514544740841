import type { ReplayGiven } from "#shared/record/checks/check.ts";
import { Problem } from "#shared/problem.ts";

/** A record file with what the auditor holds beside it, as bytes and texts that can go to a worker. */
export interface ReplayWanted {
  readonly recordText: string;
  readonly heldHashes: readonly string[];
  readonly fingerprint: string;
  readonly sourceFile: { readonly name: string; readonly bytes: Uint8Array } | null;
}

/** @throws Problem record-invalid for a file that holds no JSON. */
export function recordFrom(wanted: ReplayWanted): { record: unknown; given: ReplayGiven } {
  const given: ReplayGiven = {
    heldHashes: wanted.heldHashes,
    fingerprint: wanted.fingerprint === "" ? undefined : wanted.fingerprint,
    sourceFile: wanted.sourceFile ?? undefined,
  };
  try {
    return { record: JSON.parse(wanted.recordText) as unknown, given };
  } catch {
    throw new Problem("record-invalid", "The file holds no JSON. Take the record file as it was saved.");
  }
}
