import type { OwnersWaiting, WaitingThing } from "#shared/api/waiting.ts";
import type { EventKind } from "#shared/record/events.ts";
import type { Platform } from "../context.ts";
import { newestEventOf } from "../db/events.ts";
import { installationRow } from "../db/installation.ts";
import { invitationsOpen } from "../db/invitations-open.ts";
import { mailsByState } from "../db/mails.ts";
import { isRoleHeld } from "../db/members.ts";
import type { Reader } from "../db/open.ts";
import { countsSinceKept, hasValue, isReported, openDeclarationIn, type SurveyFacts } from "./survey-facts.ts";

/** What a survey waits for of whoever asks, in the order in which a survey goes; nothing while it is archived. */
export function whatWaits(reader: Reader, facts: SurveyFacts, now: Date): WaitingThing[] {
  if (facts.survey.archivedAt !== null) return [];
  return [
    ...(facts.roles.includes("planner") ? plannersThings(reader, facts, now) : []),
    ...leadsThings(reader, facts),
    ...(facts.roles.includes("counter") ? ownCells(facts) : []),
    ...(facts.roles.includes("auditor") ? newestHash(reader, facts) : []),
  ];
}

/** What an installation waits for of its owners. */
export function whatWaitsForOwners(platform: Pick<Platform, "db" | "dailyCopies" | "demo">): OwnersWaiting {
  const { failed, kept } = mailsByState(platform.db);
  return {
    mailsFailed: failed,
    mailsKept: kept,
    publicAddressMissing: !platform.demo && installationRow(platform.db).publicAddress === null,
    backupError: platform.dailyCopies?.lastError ?? null,
  };
}

function plannersThings(reader: Reader, facts: SurveyFacts, now: Date): WaitingThing[] {
  const next = plannersNext(facts);
  const invited = invitationsOpen(reader, facts.survey.id, now.toISOString());
  return [
    ...(next ? [next] : []),
    ...(invited.open + invited.expired > 0 ? [{ kind: "invitations", role: "planner", ...invited } as const] : []),
  ];
}

/** The one step that a survey needs before its cells are drawn. */
function plannersNext(facts: SurveyFacts): WaitingThing | null {
  const { area, frame, season, draws } = facts;
  const role = "planner";
  if (season.live) return null;
  if (!area) return { kind: "boundary", role };
  if (!frame || frame.sealedAt === null) return { kind: "sealing", role, draft: frame?.number ?? null };
  const open = openDeclarationIn(facts);
  if (open) {
    return { kind: "drawing", role, declaredAt: open.declaration.declaredAt, seedGiven: open.seed !== null };
  }
  const [last] = draws;
  return { kind: "declaring", role, withdrawn: last?.withdrawn ? last.draw.number : null };
}

/** Of the lead; of the planner where nobody is lead. */
function leadsThings(reader: Reader, facts: SurveyFacts): WaitingThing[] {
  const { roles, season, cells, keptAt } = facts;
  const isLead = roles.includes("lead");
  if (!season.live || (!isLead && !roles.includes("planner"))) return [];
  const older: WaitingThing[] =
    keptAt !== null && countsSinceKept(facts)
      ? [{ kind: "estimate-older", role: roles.includes("planner") ? "planner" : "lead", keptAt }]
      : [];
  if (!isLead && isRoleHeld(reader, facts.survey.id, "lead")) return older;
  const role = isLead ? "lead" : "planner";
  const notShared = cells.filter(({ assignment, count }) => assignment === undefined && count === undefined).length;
  const reported = cells.filter(isReported).length;
  const things: WaitingThing[] = [];
  if (notShared > 0) things.push({ kind: "not-shared-out", role, cells: notShared, of: cells.length });
  if (reported > 0) things.push({ kind: "closing", role, cells: reported });
  if (keptAt === null && cells.length > 0 && cells.every(hasValue)) {
    things.push({ kind: "all-counted", role, cells: cells.length });
  }
  return [...things, ...older];
}

/** A counter's own cells that nobody has visited, by the day that the lead wrote; days in the order in which they were given out. */
function ownCells({ cells, memberId }: SurveyFacts): WaitingThing[] {
  const own = cells.filter(({ assignment }) => memberId !== null && assignment?.memberId === memberId);
  const days = new Map<string, number>();
  const left = own
    .filter(({ count }) => count === undefined)
    .toSorted((a, b) => (a.assignment?.assignedAt ?? "").localeCompare(b.assignment?.assignedAt ?? ""));
  for (const { assignment } of left) days.set(assignment?.day ?? "", (days.get(assignment?.day ?? "") ?? 0) + 1);
  if (left.length === 0) return [];
  const byDay = [...days].map(([day, count]) => ({ day, cells: count }));
  return [{ kind: "own-cells", role: "counter", cells: left.length, of: own.length, days: byDay }];
}

const MILESTONES: Readonly<Partial<Record<EventKind, Extract<WaitingThing, { kind: "newest-hash" }>["because"]>>> = {
  "frame-sealed": "sealed",
  "draw-declared": "declared",
  "draw-made": "drawn",
  "draw-withdrawn": "withdrawn",
  "estimate-kept": "estimated",
};

/** What an auditor keeps elsewhere: the newest hash, once something is on record that could be changed in somebody's favour. */
function newestHash(reader: Reader, { survey, newestEvent }: SurveyFacts): WaitingThing[] {
  const milestone = newestEventOf(reader, survey.id, Object.keys(MILESTONES) as EventKind[]);
  const because = milestone && MILESTONES[milestone.kind as EventKind];
  if (!because || !newestEvent) return [];
  const { at } = milestone;
  const { sequence, sha256 } = newestEvent;
  return [{ kind: "newest-hash", role: "auditor", because, at, sequence, sha256 }];
}
