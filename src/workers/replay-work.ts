import type { ReplayGiven } from "#shared/record/checks/check.ts";
import { Problem } from "#shared/problem.ts";
import { replay, type ReplayReport } from "#shared/record/replay.ts";

/** A record file with what the auditor holds beside it, as bytes and texts that can go to a worker. */
export interface ReplayWanted {
  readonly recordName: string;
  readonly recordText: string;
  readonly heldHashes: readonly string[];
  readonly fingerprint: string;
  readonly sourceFile: { readonly name: string; readonly bytes: Uint8Array } | null;
}

/**
 * The work of the worker: replays what was chosen.
 * @throws Problem record-invalid that names a file which is no record
 */
export function replayWanted(
  wanted: ReplayWanted,
  onProgress: (done: number, of: number, what: string) => void,
): ReplayReport {
  const given: ReplayGiven = {
    heldHashes: wanted.heldHashes,
    fingerprint: wanted.fingerprint === "" ? undefined : wanted.fingerprint,
    sourceFile: wanted.sourceFile ?? undefined,
  };
  const report = replay(jsonOf(wanted), given, onProgress);
  const [format, ...others] = report.checks;
  // What can't be read as a record has nothing to check: that is a refusal, not a report.
  if (format?.outcome !== "failed" || others.length > 0) return report;
  throw new Problem("record-invalid", `“${wanted.recordName}”: ${format.detail}`);
}

function jsonOf({ recordName, recordText }: ReplayWanted): unknown {
  try {
    return JSON.parse(recordText) as unknown;
  } catch {
    throw new Problem("record-invalid", `“${recordName}” holds no JSON. Take the record file as it was saved.`);
  }
}
