import type { Visitor } from "../context.ts";
import { findAccount, updateAccount } from "../db/accounts.ts";
import { membersOfAccount } from "../db/members.ts";
import { writeTx } from "../db/open.ts";
import { recordEvent } from "./record-event.ts";

/** Changes one's own name; each survey whose record names this person tells it, also those that they left. */
export function changeName(ctx: Visitor, name: string): Visitor["account"] {
  writeTx(ctx.db, (tx) => {
    const before = findAccount(tx, ctx.account.id)?.name ?? ctx.account.name; // another request may have changed it
    if (name === before) return;
    updateAccount(tx, ctx.account.id, { name });
    const at = ctx.now().toISOString();
    for (const { id, surveyId } of membersOfAccount(tx, ctx.account.id)) {
      recordEvent(tx, ctx, {
        surveyId,
        at,
        memberId: id,
        kind: "member-renamed",
        payload: { version: 1, member: id, before, after: name },
      });
    }
  });
  return { ...ctx.account, name };
}
