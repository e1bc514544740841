import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import type { Reader } from "../db/open.ts";
import { visitIdsAssignedTo } from "../db/visits.ts";
import { actingMember } from "./acting-member.ts";

/** The visits that an action reaches: every one, or only those assigned to whoever acts. */
export interface OwnCells {
  readonly all: boolean;
  has(visitId: string): boolean;
}

/** The one place that turns "own cells" of the access table into visits. */
export function ownCells(ctx: Pick<Context, "reach" | "memberId" | "surveyId">, reader: Reader): OwnCells {
  if (ctx.reach === "all") return { all: true, has: () => true };
  const own = visitIdsAssignedTo(reader, actingMember(ctx));
  return { all: false, has: (visitId) => own.has(visitId) };
}

/** @throws Problem `not-allowed` where the cell is somebody else's. */
export function expectOwn(own: OwnCells, visitId: string, what: string): void {
  if (own.has(visitId)) return;
  throw new Problem("not-allowed", `${what} is not assigned to you. Ask the field lead to give it to you.`);
}
