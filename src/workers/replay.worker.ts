import { expose } from "comlink";
import { outcomeOf } from "./outcome.ts";
import { replayWanted, type ReplayWanted } from "./replay-work.ts";

const worker = {
  replay: (wanted: ReplayWanted, onProgress: (done: number, of: number, what: string) => void) =>
    outcomeOf(() => replayWanted(wanted, onProgress)),
};

export type ReplayWorker = typeof worker;

expose(worker);
