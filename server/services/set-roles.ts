import { type Role, ROLES } from "#shared/access/table.ts";
import { Problem } from "#shared/problem.ts";
import type { Context } from "../context.ts";
import { type AccountRow, findAccount } from "../db/accounts.ts";
import { openInvitationFor } from "../db/invitations.ts";
import { accountOfMember, openHolders, standingOf } from "../db/members.ts";
import { type Reader, type Tx, writeTx } from "../db/open.ts";
import { deleteSessionsOf } from "../db/sessions.ts";
import { expectOpenAccount } from "./add-person.ts";
import { actingOnPeople, endRole, giveRole } from "./give-role.ts";
import { endInvitation } from "./invite.ts";
import { tellAdded, tellRoleEnded } from "./tell-roles.ts";

/**
 * The roles that somebody holds from now on; none removes them from the survey, which ends their sessions.
 * @param seen the roles that the sender saw
 * @throws Problem `last-planner`, `account-closed`, `changed-meanwhile`
 */
export function setRoles(ctx: Context, memberId: string, roles: readonly Role[], seen?: readonly Role[]): void {
  writeTx(ctx.db, (tx) => {
    const accountId = accountOfMember(tx, memberId);
    const account = accountId === undefined ? undefined : findAccount(tx, accountId);
    if (!account) throw new Error(`member ${memberId} has no account`);
    const held = standingOf(tx, ctx.surveyId, account.id).roles;
    if (seen && !ROLES.every((role) => held.includes(role) === seen.includes(role))) {
      const now = held.length === 0 ? "no longer in the survey" : held.join(" and ");
      throw new Problem("changed-meanwhile", `${account.name} is ${now} by now. Look at the list again, then decide.`);
    }
    const ended = ROLES.filter((role) => held.includes(role) && !roles.includes(role));
    const given = ROLES.filter((role) => roles.includes(role) && !held.includes(role));
    if (given.length > 0) expectOpenAccount(account);
    if (ended.includes("planner")) expectAnotherPlanner(tx, ctx.surveyId, account);
    changeRoles(tx, ctx, account, { given, ended, last: roles.length === 0 });
  });
}

interface Change {
  readonly given: readonly Role[];
  readonly ended: readonly Role[];
  readonly last: boolean;
}

function changeRoles(tx: Tx, ctx: Context, account: AccountRow, { given, ended, last }: Change): void {
  if (given.length + ended.length === 0) return;
  const by = actingOnPeople(tx, ctx);
  const { surveyId } = ctx;
  for (const role of given) {
    giveRole(tx, ctx, { surveyId, account, role, by });
    tellAdded(tx, ctx, account, role);
  }
  for (const role of ended) {
    endRole(tx, ctx, { surveyId, account, role, by });
    tellRoleEnded(tx, ctx, account, role, last);
  }
  endOldInvitations(tx, ctx, account, last ? ROLES : [...given, ...ended]);
  if (last && account.id !== ctx.account.id) deleteSessionsOf(tx, account.id, null);
}

/** A link sent before somebody's roles were set must not give one back that was ended. */
function endOldInvitations(tx: Tx, ctx: Context, { email }: AccountRow, roles: readonly Role[]): void {
  for (const role of roles) {
    const invited = openInvitationFor(tx, email, { surveyId: ctx.surveyId, role });
    if (invited) endInvitation(tx, invited, "withdrawnAt", ctx.now().toISOString());
  }
}

/** @throws Problem `last-planner` where nobody else who can sign in is planner of the survey */
export function expectAnotherPlanner(reader: Reader, surveyId: string, account: Pick<AccountRow, "id">): void {
  if (openHolders(reader, surveyId, "planner").some(({ accountId }) => accountId !== account.id)) return;
  throw new Problem("last-planner", "Make somebody else a planner first.");
}
