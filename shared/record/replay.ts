import { Problem } from "#shared/problem.ts";
import { checkAmendments } from "./checks/amendments.ts";
import { checkAreas } from "./checks/areas.ts";
import { checkAssignments } from "./checks/assignments.ts";
import { checkChain } from "./checks/chain.ts";
import { type Check, failed, type ReplayGiven, type ReplayProgress, type ReplayRun } from "./checks/check.ts";
import { checkCounts } from "./checks/counts.ts";
import { checkDeclarations } from "./checks/declarations.ts";
import { checkDraws } from "./checks/draws.ts";
import { checkEstimates } from "./checks/estimates.ts";
import { repeatDraws } from "./checks/draws-repeated.ts";
import { rebuildFrames } from "./checks/frame-rebuilt.ts";
import { checkFrames } from "./checks/frames.ts";
import { checkHeldHashes } from "./checks/held-hashes.ts";
import { checkOrderOfProof } from "./checks/order-of-proof.ts";
import { checkPayloads } from "./checks/payloads.ts";
import { checkReferences, FORMAT_TITLE } from "./checks/references.ts";
import { RecordEvents } from "./checks/record-events.ts";
import { checkReserves } from "./checks/reserves.ts";
import { checkSeeds } from "./checks/seeds.ts";
import { checkSignatures } from "./checks/signatures.ts";
import { checkSourceFile } from "./checks/source-file.ts";
import { checkSurvey } from "./checks/survey.ts";
import { checkTold } from "./checks/told.ts";
import { checkVisits } from "./checks/visits.ts";
import { cannotShow } from "./cannot-show.ts";
import { readRecord } from "./record-file.ts";
import { type ReplaySummary, summarise, summaryOfNothing } from "./replay-summary.ts";

export interface ReplayReport {
  readonly checks: readonly Check[];
  /** What no record shows, in sentences. */
  readonly cannotShow: readonly string[];
  readonly summary: ReplaySummary;
}

type Step = readonly [what: string, check: (run: ReplayRun) => Check[]];

/** These need nothing but the events. */
const CHAIN_STEPS: readonly Step[] = [
  ["the chain of events", checkChain],
  ["what the events say", checkPayloads],
  ["the signatures", checkSignatures],
  ["the hashes that you hold", checkHeldHashes],
];

/** These follow ids from one part of the record to another. */
const STEPS: readonly Step[] = [
  ["names and people", checkSurvey],
  ["the study area", checkAreas],
  ["the boundary file", checkSourceFile],
  ["the frames", checkFrames],
  ["the declarations", checkDeclarations],
  ["the order of proof", checkOrderOfProof],
  ["the seeds", checkSeeds],
  ["the draws", checkDraws],
  ["declarations and draws told", checkTold],
  ["the reserves", checkReserves],
  ["the cells to visit", checkVisits],
  ["who went where", checkAssignments],
  ["the counts", checkCounts],
  ["the amendments", checkAmendments],
  ["the estimates", checkEstimates],
];

/**
 * Redoes from a record alone what can be redone (rules R5 to R9): chain and signatures, frames from their rings, draws
 * from their seeds, reserves in order, counts and amendments, estimates. Each check that fails names the first
 * difference: where, what the record says, what the replay gets. The same function runs in a browser's worker and in
 * Node; it holds no more than the record and one frame's runs at a time.
 * @param value a record that was read, or any JSON value: one that is no record fails the first check
 * @param onProgress told now and then; what it throws ends the replay
 */
export function replay(value: unknown, given: ReplayGiven = {}, onProgress?: ReplayProgress): ReplayReport {
  const all = [...CHAIN_STEPS, ...STEPS];
  let done = 0;
  let what = "the file";
  const tell = (): void => onProgress?.(done, all.length + 2, what);
  tell();
  const record = attempt(() => readRecord(value));
  if (record instanceof Problem) {
    const difference = { where: "the file", found: record.message, expected: "a record as the format says" };
    const check = { ...failed("format", FORMAT_TITLE, difference), detail: record.message };
    return { checks: [check], cannotShow: [], summary: summaryOfNothing };
  }
  done = 1;
  what = "the events";
  const events = new RecordEvents(record.events, tell);
  const format = checkReferences(record);
  const fitsTogether = format.outcome === "passed";
  done = 2;
  what = "the frames";
  const frames = fitsTogether ? rebuildFrames(record, events, tell) : new Map();
  const lists = fitsTogether ? repeatDraws(record, events, frames, tell) : new Map();
  const run: ReplayRun = { record, given, events, frames, lists, tell };
  const checks = [format];
  for (const [name, check] of fitsTogether ? all : CHAIN_STEPS) {
    what = name;
    tell();
    checks.push(...check(run));
    done += 1;
  }
  tell();
  return { checks, cannotShow: cannotShow(record), summary: summarise(run, checks) };
}

function attempt<T>(work: () => T): T | Problem {
  try {
    return work();
  } catch (error) {
    if (error instanceof Problem) return error;
    throw error;
  }
}
