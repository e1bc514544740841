import * as api from "#shared/api/accounts.ts";
import type { Mount } from "../http/mount.ts";
import { presentSession } from "../presenters/account.ts";
import { checkPassword } from "../services/check-password.ts";

export function accountRoutes(mount: Mount): void {
  mount.open(api.readSession, (ctx) => presentSession(ctx, ctx.account));

  mount.open(api.signIn, async (ctx, { body, source, session }) => {
    const account = await checkPassword(ctx, { ...body, source });
    await session.start(account);
    return presentSession(ctx, account);
  });

  mount.signedIn(api.signOut, async (ctx, { session }) => {
    await session.end();
    return presentSession(ctx, null);
  });
}
