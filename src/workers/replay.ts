import { proxy, wrap } from "comlink";
import { Problem } from "#shared/problem.ts";
import type { ReplayReport } from "#shared/record/replay.ts";
import { valueOf } from "./outcome.ts";
import type { ReplayWanted } from "./replay-work.ts";
import type { ReplayWorker } from "./replay.worker.ts";

/** How far a replay is, and with what. */
export interface ReplayAt {
  readonly share: number;
  readonly what: string;
}

/**
 * Replays a record in a worker of its own; cancelling ends the worker, whatever it is at.
 * @throws Problem record-invalid; `cancelled` when the signal ended it.
 */
export async function replayRecord(
  wanted: ReplayWanted,
  onProgress: (at: ReplayAt) => void,
  signal: AbortSignal,
): Promise<ReplayReport> {
  const worker = new Worker(new URL("./replay.worker.ts", import.meta.url), { type: "module", name: "replay" });
  const cancelled = new Promise<never>((_, reject) => {
    signal.addEventListener("abort", () => {
      reject(new Problem("cancelled", "Nothing was checked."));
    });
  });
  try {
    const work = wrap<ReplayWorker>(worker).replay(
      wanted,
      proxy((done, of, what) => {
        onProgress({ share: done / of, what });
      }),
    );
    return valueOf(await Promise.race([work, cancelled]));
  } finally {
    worker.terminate();
  }
}
