/** How far the work at one station is. Each state has its own shape and its own word. */
export type StageState = "not-started" | "in-work" | "attention" | "done";

export const STAGE_STATE_WORDS: Readonly<Record<StageState, string>> = {
  "not-started": "not started",
  "in-work": "in work",
  attention: "needs attention",
  done: "done",
};

/** One station of the rail. */
export interface Stage {
  readonly id: string;
  readonly name: string;
  /** One short line below the name: "version 2, sealed". Without one the state's word stands there. */
  readonly note?: string | undefined;
  readonly state: StageState;
  readonly to: string;
}

/** The station up to which the connecting line is solid: the last one that is not "not started", the closing station (which is in work from the first day) left aside. */
export function reachedIndex(stages: readonly Stage[]): number {
  let reached = 0;
  stages.forEach((stage, index) => {
    if (stage.state !== "not-started" && index < stages.length - 1) reached = index;
  });
  return stages.every((stage) => stage.state === "done") ? stages.length - 1 : reached;
}
