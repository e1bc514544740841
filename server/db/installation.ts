import { count } from "drizzle-orm";
import type { Reader, Tx } from "./open.ts";
import { accounts } from "./schema/accounts.ts";
import { installation } from "./schema/installation.ts";
import { surveys } from "./schema/surveys.ts";

export type InstallationRow = Omit<typeof installation.$inferSelect, "id">;

/** What the owner has set; nothing at first. */
export function installationRow(reader: Reader): InstallationRow {
  const row = reader.select().from(installation).get();
  return row ?? { publicAddress: null, baseMapUrl: null, baseMapAttribution: null };
}

export function saveInstallation(tx: Tx, row: InstallationRow): void {
  tx.insert(installation)
    .values({ id: 1, ...row })
    .onConflictDoUpdate({ target: installation.id, set: row })
    .run();
}

/** How much there is: surveys with the archived ones, accounts with the closed ones. */
export function howMany(reader: Reader): { readonly surveys: number; readonly accounts: number } {
  return {
    surveys: reader.select({ rows: count() }).from(surveys).get()?.rows ?? 0,
    accounts: reader.select({ rows: count() }).from(accounts).get()?.rows ?? 0,
  };
}
