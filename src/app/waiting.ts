import { reach, ROLES, type Action } from "#shared/access/table.ts";
import type { Stage, StageState, SurveySummary } from "#shared/api/surveys.ts";
import type { Waiting } from "../features/surveys/WaitingList.tsx";
import { paths } from "./paths.ts";
import { STAGE_NAMES, stageThatMatters } from "./stages.ts";

interface Step {
  readonly action: Action;
  /** What is the case while the stage is not begun; later its own note is told. */
  readonly fact: string;
  readonly next: string;
  readonly link: string;
}

const STEPS: Readonly<Partial<Record<Stage, Step>>> = {
  area: {
    action: "area.change",
    fact: "There is no study area yet.",
    next: "Import the boundary file: everything else rests on it.",
    link: "Import the boundary",
  },
  frame: {
    action: "frame.change",
    fact: "The cells are not chosen yet.",
    next: "Choose size and edge rule, look at what the estimate will speak for, then seal the frame.",
    link: "Choose the cells",
  },
  draw: {
    action: "draw.make",
    fact: "No cells are drawn yet.",
    next: "Say how many picks and how the seed will be made, then draw.",
    link: "Draw the cells",
  },
  field: {
    action: "field.assign",
    fact: "The drawn cells are in nobody’s list yet.",
    next: "Share them out and take the waypoints along.",
    link: "Share them out",
  },
  counts: {
    action: "counts.enter",
    fact: "No count is entered yet.",
    next: "Zero is a count; a cell that nobody reached is not.",
    link: "Enter counts",
  },
};

/** The stage that matters; for a counter it is Counts as soon as cells are in the field, since that is where they act. */
function ownStage(survey: SurveySummary): StageState | undefined {
  const stage = stageThatMatters(survey.roles, survey.stages);
  if (stage?.stage !== "field" || reach(survey.roles, "field.assign") !== "none") return stage;
  const counts = survey.stages.find((one) => one.stage === "counts");
  return stage.state === "not-started" || counts?.state === "done" ? stage : counts;
}

/** What this person can do next in a survey, or nothing. */
export function waitingIn(survey: SurveySummary): Waiting | null {
  const stage = ownStage(survey);
  const step = stage === undefined ? undefined : STEPS[stage.stage];
  if (stage === undefined || step === undefined || reach(survey.roles, step.action) === "none") return null;
  const role = ROLES.find((one) => survey.roles.includes(one) && reach([one], step.action) !== "none");
  return {
    key: survey.id,
    state: stage.state,
    role: role ?? "member",
    survey: survey.name,
    fact: stage.state === "not-started" ? step.fact : `${STAGE_NAMES[stage.stage]}: ${stage.note}.`,
    next: step.next,
    link: step.link,
    to: paths.stage(survey.id, stage.stage),
  };
}

const NUMBERS = [
  "Nothing",
  "One",
  "Two",
  "Three",
  "Four",
  "Five",
  "Six",
  "Seven",
  "Eight",
  "Nine",
  "Ten",
  "Eleven",
  "Twelve",
];

/** "Three things wait for you." */
export function waitingTitle(count: number): string {
  if (count === 0) return "Nothing waits for you.";
  return `${NUMBERS[count] ?? count} ${count === 1 ? "thing waits" : "things wait"} for you.`;
}
