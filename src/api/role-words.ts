import type { Role } from "#shared/access/table.ts";

/** What each role does, in one sentence: where roles are given, and where somebody is invited to one. */
export const ROLE_DOES: Readonly<Record<Role, string>> = {
  planner: "Sets up area, frame, draw and people; reads and amends everything.",
  lead: "Shares cells out, takes waypoints along, enters and amends counts; reads the estimate.",
  counter: "Sees and counts the cells that are given to them.",
  auditor: "Reads everything, replays the record, changes nothing.",
};

export const ROLE_NAMES: Readonly<Record<Role, string>> = {
  planner: "Planner",
  lead: "Lead",
  counter: "Counter",
  auditor: "Auditor",
};
