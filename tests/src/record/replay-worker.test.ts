import { afterEach, expect, test, vi } from "vitest";
import { replayRecord } from "../../../src/workers/replay.ts";

/** A worker that takes messages and never answers. */
class SilentWorker extends EventTarget {
  static readonly made: SilentWorker[] = [];
  readonly postMessage = vi.fn();
  readonly terminate = vi.fn();
  constructor() {
    super();
    SilentWorker.made.push(this);
  }
}

afterEach(() => {
  vi.unstubAllGlobals();
  SilentWorker.made.length = 0;
});

const wanted = { recordName: "r.json", recordText: "{}", heldHashes: [], fingerprint: "", sourceFile: null };

function begin(signal: AbortSignal) {
  vi.stubGlobal("Worker", SilentWorker);
  const running = replayRecord(wanted, () => undefined, signal);
  return { running, worker: SilentWorker.made[0] };
}

test("a replay that was cancelled before it began ends at once, with its worker", async () => {
  const { running, worker } = begin(AbortSignal.abort());
  await expect(running).rejects.toMatchObject({ code: "cancelled" });
  expect(worker?.terminate).toHaveBeenCalledOnce();
});

test("cancelling ends the worker, whatever it is at", async () => {
  const control = new AbortController();
  const { running, worker } = begin(control.signal);
  control.abort();
  await expect(running).rejects.toMatchObject({ code: "cancelled" });
  expect(worker?.terminate).toHaveBeenCalledOnce();
});

test("a worker whose code can't be fetched is a refusal, not a wait without end", async () => {
  const { running, worker } = begin(new AbortController().signal);
  worker?.dispatchEvent(new Event("error"));
  await expect(running).rejects.toMatchObject({ code: "unreachable" });
});
