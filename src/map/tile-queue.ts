/** Work that can wait for the next frame; false from `wanted` drops it unseen. */
export interface TileJob {
  readonly wanted: () => boolean;
  readonly run: () => void;
}

export interface TileQueue {
  readonly add: (job: TileJob) => void;
  readonly clear: () => void;
}

/**
 * Runs jobs in order, at most `budget` ms of them an animation frame (at least one), so that no frame is late because many tiles came
 * at once. `frame` and `now` come from the caller in tests.
 */
export function createTileQueue(
  budget = 8,
  frame: (callback: () => void) => void = (callback) => requestAnimationFrame(callback),
  now: () => number = () => performance.now(),
): TileQueue {
  let jobs: TileJob[] = [];
  let waiting = false;
  const work = () => {
    waiting = false;
    const end = now() + budget;
    let done = 0;
    while (done < jobs.length) {
      const job = jobs[done];
      done += 1;
      if (job?.wanted() === true) {
        job.run();
        if (now() >= end) break;
      }
    }
    jobs = jobs.slice(done);
    if (jobs.length > 0) start();
  };
  const start = () => {
    if (waiting) return;
    waiting = true;
    frame(work);
  };
  return {
    add: (job) => {
      jobs.push(job);
      start();
    },
    clear: () => {
      jobs = [];
    },
  };
}
