import type { Reader, Tx } from "./open.ts";
import { installation } from "./schema/installation.ts";

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
