import { Problem } from "#shared/problem.ts";
import { backUp } from "../services/back-up.ts";
import type { JobAnswer } from "./jobs.ts";
import { searchEpsg } from "./epsg.ts";
import { judgeCountsTask } from "./judge-counts.ts";
import { makePlaneTask } from "./make-plane.ts";
import { placeEntries } from "./place-entries.ts";
import { readAreaTask } from "./read-area.ts";
import { sealFrameTask } from "./seal-frame.ts";
import { writeWaypoints } from "./write-waypoints.ts";
import type { JobName, JobResults, JobTasks } from "./tasks.ts";

type Work = { [N in JobName]: (task: JobTasks[N]) => JobResults[N] | Promise<JobResults[N]> };

const work: Work = {
  "read-area": readAreaTask,
  "make-plane": makePlaneTask,
  "search-crs": ({ text, projectedOnly }) => searchEpsg(text, 20, { projectedOnly }),
  "seal-frame": sealFrameTask,
  "place-entries": placeEntries,
  "back-up": backUp,
  "write-waypoints": writeWaypoints,
  "judge-counts": judgeCountsTask,
};

/** Runs one task in a worker thread; a refusal comes back as a value, since errors lose their class on the way. */
export async function runTask(message: { name: JobName; task: never }): Promise<JobAnswer<unknown>> {
  try {
    return { value: await work[message.name](message.task) };
  } catch (error) {
    if (!(error instanceof Problem)) throw error;
    const { code, message: detail, question } = error;
    return { refused: { code, detail, ...(question ? { question } : {}) } };
  }
}
