import { reach, type Role } from "#shared/access/table.ts";
import { STAGES, type Stage, type StageState } from "#shared/api/surveys.ts";
import type { Stage as Station } from "../components/ui/stage-state.ts";
import { paths } from "./paths.ts";

export const STAGE_NAMES: Readonly<Record<Stage, string>> = {
  area: "Area",
  frame: "Frame",
  plan: "Plan",
  draw: "Draw",
  field: "Field",
  counts: "Counts",
  estimate: "Estimate",
  record: "Record",
};

/** The stages that mean something to these roles: a counter works on Field and Counts only. */
export function stagesFor(roles: readonly Role[]): readonly Stage[] {
  if (reach(roles, "survey.see") === "all") return STAGES;
  return roles.length === 0 ? [] : ["field", "counts"];
}

/** The stations of the rail, as far as these roles go. */
export function stations(surveyId: string, roles: readonly Role[], states: readonly StageState[]): Station[] {
  return stagesFor(roles).map((stage) => {
    const found = states.find((one) => one.stage === stage);
    const state = found?.state ?? "not-started";
    return {
      id: stage,
      name: STAGE_NAMES[stage],
      state,
      note: found?.note === "" ? undefined : found?.note,
      to: paths.stage(surveyId, stage),
    };
  });
}

/**
 * The stage that matters now: the first that needs attention, else the furthest one in work (the record, which is in work from the
 * first day, left aside), else the first not begun (the plan, which can be left out, left aside), else the record.
 */
export function stageThatMatters(roles: readonly Role[], states: readonly StageState[]): StageState | undefined {
  const mine = new Set(stagesFor(roles));
  const seen = states.filter((one) => mine.has(one.stage));
  const work = seen.filter((one) => one.stage !== "record");
  return (
    work.find((one) => one.state === "attention") ??
    work.findLast((one) => one.state === "in-work") ??
    work.find((one) => one.state === "not-started" && one.stage !== "plan") ??
    seen.at(-1)
  );
}
