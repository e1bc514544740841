/**
 * Who may do what: the one table that the server enforces and the client reads to show or hide what can be done.
 *
 * Roles are held in a survey; one person may hold two, and then may do what either may. "own" means: only on the cells
 * that are assigned to this person. "owner" is a property of an account and gives no right inside a survey, but for
 * people: an owner may see and add members (and so make themself one), which is an event in the survey's record.
 */
export const ROLES = ["planner", "lead", "counter", "auditor"] as const;
export type Role = (typeof ROLES)[number];

export type Reach = "all" | "own" | "none";

interface Rule {
  readonly planner?: "all";
  readonly lead?: "all";
  readonly counter?: "all" | "own";
  readonly auditor?: "all";
  readonly owner?: true;
}

const everyone = { planner: "all", lead: "all", counter: "own", auditor: "all" } as const satisfies Rule;
const planner = { planner: "all" } as const satisfies Rule;
const office = { planner: "all", lead: "all" } as const satisfies Rule;
const readers = { planner: "all", lead: "all", auditor: "all" } as const satisfies Rule;

const TABLE = {
  "survey.see": everyone,
  "settings.change": planner,
  "people.see": { planner: "all", lead: "all", auditor: "all", owner: true },
  "people.change": { planner: "all", owner: true },
  "area.change": planner,
  "frame.change": planner,
  "draw.make": planner,
  "field.assign": office,
  "field.export": { planner: "all", lead: "all", counter: "own" },
  "field.close": office,
  "counts.enter": { planner: "all", lead: "all", counter: "own" },
  "counts.amend": office,
  "counts.import": office,
  "estimate.read": readers,
  "estimate.keep": office,
  "record.read": readers,
} as const satisfies Record<string, Rule>;

export type Action = keyof typeof TABLE;

/** How far an action reaches for somebody who holds these roles: all cells, their own, or not at all. */
export function reach(roles: readonly Role[], action: Action): Reach {
  const rule: Rule = TABLE[action];
  if (roles.some((role) => rule[role] === "all")) return "all";
  return roles.some((role) => rule[role] === "own") ? "own" : "none";
}

/** Whether the owner of the installation may do this without holding a role in the survey. */
export function ownerMay(action: Action): boolean {
  const rule: Rule = TABLE[action];
  return rule.owner === true;
}
