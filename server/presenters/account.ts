import type { Account, Session } from "#shared/api/accounts.ts";
import type { SignedInAt } from "#shared/api/people.ts";
import type { Platform } from "../context.ts";
import { installationRow } from "../db/installation.ts";
import type { SessionRow } from "../db/sessions.ts";
import { sessionHandle } from "../services/end-sessions.ts";
import { presentBaseMap } from "./installation.ts";

export function presentSession(platform: Platform, account: Account | null): Session {
  const baseMap = account && presentBaseMap(installationRow(platform.db));
  return { account: account && presentAccount(account), demo: platform.demo, version: platform.version, baseMap };
}

export function presentAccount({ id, name, email, isOwner }: Account): Account {
  return { id, name, email, isOwner };
}

export function presentSessions(rows: readonly SessionRow[], current: string): { sessions: SignedInAt[] } {
  return {
    sessions: rows.map(({ id, createdAt, lastSeenAt, userAgent }) => ({
      handle: sessionHandle(id),
      startedAt: createdAt,
      lastSeenAt,
      userAgent,
      isThis: id === current,
    })),
  };
}
