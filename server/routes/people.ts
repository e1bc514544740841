import * as api from "#shared/api/people.ts";
import type { Mount } from "../http/mount.ts";
import { presentAccount, presentSession, presentSessions } from "../presenters/account.ts";
import { presentInvitationSeen, presentPeople } from "../presenters/people.ts";
import { acceptInvitation } from "../services/accept-invitation.ts";
import { addPerson } from "../services/add-person.ts";
import { changeName } from "../services/change-name.ts";
import { changePassword } from "../services/change-password.ts";
import { endOtherSessions, endSession, listSessions } from "../services/end-sessions.ts";
import { leaveSurvey } from "../services/leave-survey.ts";
import { listPeople } from "../services/list-people.ts";
import { readInvitation } from "../services/read-invitation.ts";
import { renewInvitation } from "../services/renew-invitation.ts";
import { requestReset } from "../services/send-reset.ts";
import { setRoles } from "../services/set-roles.ts";
import { readReset, useReset as setPasswordByLink } from "../services/use-reset.ts";
import { withdrawInvitation } from "../services/withdraw-invitation.ts";

export function peopleRoutes(mount: Mount): void {
  mount.survey(api.listPeople, (ctx) => presentPeople(ctx, listPeople(ctx)));

  mount.survey(api.addPerson, (ctx, { body }) => {
    addPerson(ctx, body);
    return presentPeople(ctx, listPeople(ctx));
  });

  mount.survey(api.setRoles, (ctx, { params, body }) => {
    setRoles(ctx, params.memberId, body.roles, body.seen);
    return presentPeople(ctx, listPeople(ctx));
  });

  mount.survey(api.leaveSurvey, (ctx) => {
    leaveSurvey(ctx);
    return {};
  });

  mount.survey(api.renewInvitation, (ctx, { params }) => {
    renewInvitation(ctx, params.invitationId);
    return presentPeople(ctx, listPeople(ctx));
  });

  mount.survey(api.withdrawInvitation, (ctx, { params }) => {
    withdrawInvitation(ctx, params.invitationId);
    return presentPeople(ctx, listPeople(ctx));
  });

  linkRoutes(mount);
  ownAccountRoutes(mount);
}

/** What somebody reaches by a link in a mail. */
function linkRoutes(mount: Mount): void {
  mount.open(api.readInvitation, (ctx, { params }) =>
    presentInvitationSeen(ctx, readInvitation(ctx, ctx.db, params.secret)),
  );

  mount.open(api.acceptInvitation, async (ctx, { params, body, source, session }) => {
    const { account, surveyId } = await acceptInvitation(ctx, {
      ...params,
      name: body.name,
      password: body.password,
      source,
    });
    await session.start(account);
    return { session: presentSession(ctx, account), surveyId };
  });

  mount.open(api.requestReset, async (ctx, { body }) => {
    await requestReset(ctx, body.email);
    return {};
  });

  mount.open(api.readReset, (ctx, { params }) => {
    const { account, reset } = readReset(ctx, ctx.db, params.secret);
    return { email: account.email, expiresAt: reset.expiresAt };
  });

  mount.open(api.useReset, async (ctx, { params, body, session }) => {
    const account = await setPasswordByLink(ctx, params.secret, body.password);
    await session.start(account);
    return presentSession(ctx, account);
  });
}

function ownAccountRoutes(mount: Mount): void {
  mount.signedIn(api.changeName, (ctx, { body }) => presentAccount(changeName(ctx, body.name)));

  mount.signedIn(api.changePassword, async (ctx, { body, source, session }) => {
    await changePassword(ctx, { ...body, sessionId: await session.id(), source });
    return presentSession(ctx, ctx.account);
  });

  mount.signedIn(api.listSessions, async (ctx, { session }) => presentSessions(listSessions(ctx), await session.id()));

  mount.signedIn(api.endSession, async (ctx, { params, session }) => {
    endSession(ctx, params.handle);
    return presentSessions(listSessions(ctx), await session.id());
  });

  mount.signedIn(api.endOtherSessions, async (ctx, { session }) => {
    endOtherSessions(ctx, await session.id());
    return presentSessions(listSessions(ctx), await session.id());
  });
}
