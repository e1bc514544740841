import type { Platform } from "../context.ts";
import { installationRow } from "../db/installation.ts";
import type { Reader } from "../db/open.ts";

/** The address of a page for people outside: under the public address, or where this process answers while there is none. */
export function linkTo(reader: Reader, platform: Pick<Platform, "ownAddress">, path: `/${string}`): string {
  const base = installationRow(reader).publicAddress ?? platform.ownAddress();
  return `${base.replace(/\/+$/, "")}${path}`;
}
