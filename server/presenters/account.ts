import type { Account, Session } from "#shared/api/accounts.ts";
import type { Platform } from "../context.ts";

export function presentSession(platform: Platform, account: Account | null): Session {
  return { account, demo: platform.demo, version: platform.version };
}
