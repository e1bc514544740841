import type { Context } from "../context.ts";
import { type MemberRow, membersOf } from "../db/members.ts";

export function listMembers(ctx: Context): MemberRow[] {
  return membersOf(ctx.db, ctx.surveyId);
}
