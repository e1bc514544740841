import { expose } from "comlink";
import { replay } from "#shared/record/replay.ts";
import { outcomeOf } from "./outcome.ts";
import { recordFrom, type ReplayWanted } from "./replay-work.ts";

const worker = {
  replay: (wanted: ReplayWanted, onProgress: (done: number, of: number, what: string) => void) =>
    outcomeOf(() => {
      const { record, given } = recordFrom(wanted);
      return replay(record, given, onProgress);
    }),
};

export type ReplayWorker = typeof worker;

expose(worker);
