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
 * @throws Problem record-invalid; `cancelled` when the signal ended it; `unreachable` when the worker's code can't be fetched.
 */
export async function replayRecord(
  wanted: ReplayWanted,
  onProgress: (at: ReplayAt) => void,
  signal: AbortSignal,
): Promise<ReplayReport> {
  const worker = new Worker(new URL("./replay.worker.ts", import.meta.url), { type: "module", name: "replay" });
  try {
    const ended = endOf(worker, signal);
    const work = wrap<ReplayWorker>(worker).replay(
      wanted,
      proxy((done, of, what) => {
        onProgress({ share: done / of, what });
      }),
    );
    return valueOf(await Promise.race([work, ended]));
  } finally {
    worker.terminate();
  }
}

/** Rejects when the signal ends the work, also one that ended before it began, and when the worker can't start. */
function endOf(worker: Worker, signal: AbortSignal): Promise<never> {
  return new Promise((_, reject) => {
    const cancel = () => reject(new Problem("cancelled", "Nothing was checked."));
    if (signal.aborted) cancel();
    signal.addEventListener("abort", cancel);
    worker.addEventListener("error", () => {
      reject(
        new Problem("unreachable", "The part that replays could not be fetched. Check the network, then try again."),
      );
    });
  });
}
