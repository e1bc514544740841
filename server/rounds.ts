import type { Logger } from "pino";

/** Work that a server does now and then beside answering. */
export interface Round {
  readonly name: string;
  readonly everyMs: number;
  readonly work: () => Promise<void> | void;
}

/** Does each round again and again, the first soon after the start, never two of one at once. Returns what ends them. */
export function startRounds(
  rounds: readonly Round[],
  log: Pick<Logger, "error">,
  firstAfterMs = 1000,
): () => Promise<void> {
  let ended = false;
  const timers = new Map<string, NodeJS.Timeout>();
  const running = new Map<string, Promise<void>>();
  const plan = (round: Round, afterMs: number): void => {
    if (ended) return;
    timers.set(
      round.name,
      setTimeout(() => running.set(round.name, go(round)), afterMs),
    );
  };
  const go = async (round: Round): Promise<void> => {
    try {
      await round.work();
    } catch (error) {
      log.error({ err: error, round: round.name }, "a round failed; it is tried again");
    }
    plan(round, round.everyMs);
  };
  for (const round of rounds) plan(round, firstAfterMs);
  return async () => {
    ended = true;
    for (const timer of timers.values()) clearTimeout(timer);
    await Promise.all(running.values());
  };
}
