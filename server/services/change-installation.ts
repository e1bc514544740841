import type { InstallationSettings } from "#shared/api/installation.ts";
import { Problem } from "#shared/problem.ts";
import type { Visitor } from "../context.ts";
import { type InstallationRow, installationRow, saveInstallation } from "../db/installation.ts";
import { writeTx } from "../db/open.ts";

export function readInstallationSettings({ db }: Visitor): InstallationRow {
  return installationRow(db);
}

/**
 * What an owner sets for everybody. `expectSeen` refuses where the settings are no longer those that the owner saw.
 * @throws Problem `input-invalid` for a public address that links can't begin with
 */
export function changeInstallation(
  { db }: Visitor,
  { publicAddress, baseMap }: InstallationSettings,
  expectSeen: (current: InstallationRow) => void,
): InstallationRow {
  const row: InstallationRow = {
    publicAddress: publicAddress === null ? null : startOfLinks(publicAddress),
    baseMapUrl: baseMap?.url ?? null,
    baseMapAttribution: baseMap?.attribution ?? null,
  };
  return writeTx(db, (tx) => {
    expectSeen(installationRow(tx));
    saveInstallation(tx, row);
    return row;
  });
}

/** Without the slash at its end: pages' addresses begin with one. */
function startOfLinks(address: string): string {
  const { origin, pathname, search, hash, username, password } = new URL(address);
  if ([search, hash, username, password].some((part) => part !== "")) {
    throw new Problem(
      "input-invalid",
      "The public address cannot hold a question mark, a # or a password. Give it as https://surveys.example.org.",
    );
  }
  return `${origin}${pathname}`.replace(/\/+$/, "");
}
