import type { Role } from "#shared/access/table.ts";
import { keyFingerprint, publicKeyOf } from "#shared/record/sign.ts";
import type { Context } from "../context.ts";
import type { AccountRow } from "../db/accounts.ts";
import type { Tx } from "../db/open.ts";
import { findSurvey } from "../db/surveys.ts";
import { queueMail } from "../mail/queue-mail.ts";
import type { Written } from "../mail/template.ts";
import { addedMail, roleEndedMail } from "../mail/templates/roles.ts";
import { linkTo } from "./link-to.ts";

/** Tells somebody of a role that somebody else gave them. */
export function tellAdded(tx: Tx, ctx: Context, account: AccountRow, role: Role): void {
  tell(tx, ctx, account, {
    kind: "added",
    write: (survey) =>
      addedMail({
        survey,
        role,
        by: ctx.account.name,
        link: linkTo(tx, ctx, `/surveys/${ctx.surveyId}`),
        keyFingerprint: keyFingerprint(publicKeyOf(ctx.signingKey)),
      }),
  });
}

/** Tells somebody of a role that somebody else ended; `last`: they hold none any more. */
export function tellRoleEnded(tx: Tx, ctx: Context, account: AccountRow, role: Role, last: boolean): void {
  tell(tx, ctx, account, {
    kind: "role-ended",
    write: (survey) => roleEndedMail({ survey, role, by: ctx.account.name, last }),
  });
}

interface Told {
  readonly kind: string;
  readonly write: (survey: string) => Written;
}

/** Nobody is written to of what they did themself, or after their account was closed. */
function tell(tx: Tx, ctx: Context, account: AccountRow, { kind, write }: Told): void {
  if (account.id === ctx.account.id || account.closedAt !== null) return;
  queueMail(tx, ctx, {
    kind,
    to: { name: account.name, address: account.email },
    surveyId: ctx.surveyId,
    secret: false,
    written: write(findSurvey(tx, ctx.surveyId)?.name ?? ctx.surveyId),
  });
}
