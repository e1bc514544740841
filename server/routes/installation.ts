import * as api from "#shared/api/installation.ts";
import type { Mount } from "../http/mount.ts";
import {
  presentInstallation,
  presentInstallationSettings,
  presentMail,
  presentMailSummary,
} from "../presenters/installation.ts";
import { presentAccounts } from "../presenters/owned-accounts.ts";
import { changeAccount } from "../services/change-account.ts";
import { changeInstallation, readInstallationSettings } from "../services/change-installation.ts";
import { inviteAccount } from "../services/invite-account.ts";
import { listMails, readMail } from "../services/list-mails.ts";
import { readInstallation } from "../services/read-installation.ts";
import { sendMailAgain } from "../services/send-mail-again.ts";
import { sendReset } from "../services/send-reset.ts";
import { withdrawAccountInvitation } from "../services/withdraw-invitation.ts";

export function installationRoutes(mount: Mount): void {
  mount.signedIn(api.readInstallation, async (ctx) => presentInstallation(ctx, await readInstallation(ctx)));

  mount.signedIn(api.readInstallationSettings, (ctx) => presentInstallationSettings(readInstallationSettings(ctx)));

  mount.signedIn(api.changeInstallationSettings, (ctx, { body, expectSeen }) => {
    const changed = changeInstallation(ctx, body, (current) => expectSeen(presentInstallationSettings(current)));
    return presentInstallationSettings(changed);
  });

  accountsRoutes(mount);

  mount.signedIn(api.listMails, (ctx, { query }) => {
    const { mails, more } = listMails(ctx, query);
    return { mails: mails.map(presentMailSummary), more };
  });

  mount.signedIn(api.readMail, (ctx, { params }) => presentMail(readMail(ctx, params.mailId)));

  mount.signedIn(api.sendMailAgain, (ctx, { params }) => presentMail(sendMailAgain(ctx, params.mailId)));
}

function accountsRoutes(mount: Mount): void {
  mount.signedIn(api.listAccounts, (ctx) => presentAccounts(ctx));

  mount.signedIn(api.inviteAccount, (ctx, { body }) => {
    inviteAccount(ctx, body);
    return presentAccounts(ctx);
  });

  mount.signedIn(api.withdrawAccountInvitation, (ctx, { params }) => {
    withdrawAccountInvitation(ctx, params.invitationId);
    return presentAccounts(ctx);
  });

  mount.signedIn(api.changeAccount, (ctx, { params, body }) => {
    changeAccount(ctx, params.accountId, body);
    return presentAccounts(ctx);
  });

  mount.signedIn(api.sendReset, (ctx, { params }) => {
    sendReset(ctx, params.accountId);
    return {};
  });
}
