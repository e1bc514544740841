import type { Context } from "../context.ts";

/** The member who acts. Actions that write are reached through a role, so there always is one. */
export function actingMember(ctx: Pick<Context, "memberId" | "surveyId">): string {
  if (ctx.memberId === null) throw new Error(`nobody acts in survey ${ctx.surveyId}`);
  return ctx.memberId;
}
