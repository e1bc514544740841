import { existsSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { Piscina } from "piscina";
import { Problem, type ProblemCode, type Question } from "#shared/problem.ts";
import type { JobName, JobResults, JobTasks } from "./tasks.ts";

/** Heavy work in worker threads, so that no request waits for another's. */
export interface Jobs {
  run<N extends JobName>(name: N, task: JobTasks[N], signal?: AbortSignal): Promise<JobResults[N]>;
  close(): Promise<void>;
}

/** What a worker answers: a value, or a refusal that keeps its code across the thread border. */
export type JobAnswer<T> =
  | { readonly value: T }
  | { readonly refused: { readonly code: ProblemCode; readonly detail: string; readonly question?: Question } };

/** Starts the pool: the built worker beside the built server, or the source through tsx in development and tests. */
export function startJobs(): Jobs {
  const built = new URL("./jobs/worker.js", import.meta.url);
  const source = new URL("./worker-from-source.mjs", import.meta.url);
  const worker = existsSync(fileURLToPath(built)) ? built : source;
  const pool = new Piscina({
    filename: worker.href,
    name: "runTask",
    minThreads: 1,
    maxThreads: 2,
    idleTimeout: 60_000,
    execArgv: [],
  });
  return {
    async run(name, task, signal) {
      const answer = (await pool.run({ name, task }, signal ? { signal } : {})) as JobAnswer<never>;
      if ("refused" in answer) throw new Problem(answer.refused.code, answer.refused.detail, answer.refused.question);
      return answer.value;
    },
    close: () => pool.destroy(),
  };
}
