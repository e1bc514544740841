/** The kinds of heavy work: what goes in and what comes out. Each runs in server/jobs/worker.ts. */
export interface JobTasks {
  ping: { readonly text: string };
}

export interface JobResults {
  ping: string;
}

export type JobName = keyof JobTasks;
