import type { CrsChoice } from "#shared/api/area.ts";
import type { FrameSpec, FrameSummary } from "#shared/api/frame.ts";
import type { AreaAnswers } from "#shared/area/questions.ts";
import type { ImportReport } from "#shared/area/report.ts";
import type { BackupTask } from "../services/back-up.ts";
import type { CountsTask, JudgedCounts } from "./judge-counts.ts";
import type { EntriesTask, PlacedEntry } from "./place-entries.ts";
import type { WaypointsTask, WrittenWaypoints } from "./write-waypoints.ts";

/** The kinds of heavy work: what goes in and what comes out. Each runs in a worker thread (server/jobs/worker.ts). */
export interface JobTasks {
  "read-area": {
    readonly name: string;
    readonly bytes: Uint8Array;
    readonly answers: AreaAnswers;
  };
  "make-plane": { readonly geometry: string; readonly epsg: number };
  "search-crs": { readonly text: string; readonly projectedOnly: boolean };
  "seal-frame": {
    readonly rings: string;
    readonly spec: FrameSpec;
    readonly crs: { readonly text: string; readonly epsg: number };
    readonly source: { readonly sha256: string; readonly crs: string };
    readonly mending: readonly string[];
    readonly salt: string;
  };
  "place-entries": EntriesTask;
  "back-up": BackupTask;
  "write-waypoints": WaypointsTask;
  "judge-counts": CountsTask;
}

export interface JobResults {
  "read-area": {
    readonly geometry: string;
    readonly report: ImportReport;
    readonly outline: [number, number][][][];
    readonly outlineSimplified: boolean;
    readonly suggestedCrs: CrsChoice[];
  };
  "make-plane": {
    readonly crsName: string;
    readonly crsText: string;
    readonly rings: string;
    readonly ringsSha256: string;
    readonly planeAreaSquareMetres: number;
    readonly geodesicAreaSquareMetres: number;
    readonly notes: string[];
    readonly net: [number, number, number, number][];
  };
  "search-crs": CrsChoice[];
  "seal-frame": {
    readonly statement: string;
    readonly frameSha256: string;
    readonly listSha256: string;
    readonly units: number;
    readonly cells: Uint8Array;
    readonly summary: FrameSummary;
  };
  "place-entries": PlacedEntry[];
  "back-up": number;
  "write-waypoints": WrittenWaypoints;
  "judge-counts": JudgedCounts;
}

export type JobName = keyof JobTasks;
