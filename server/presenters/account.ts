import type { Account, Session } from "#shared/api/accounts.ts";
import type { Platform } from "../context.ts";
import { installationRow } from "../db/installation.ts";
import { presentBaseMap } from "./installation.ts";

export function presentSession(platform: Platform, account: Account | null): Session {
  const baseMap = account && presentBaseMap(installationRow(platform.db));
  return { account, demo: platform.demo, version: platform.version, baseMap };
}
