import type { Platform } from "../context.ts";
import { anyAccount } from "../db/accounts.ts";

/** Asks the database something small; throws when it does not answer. */
export function ready({ db }: Pick<Platform, "db">): void {
  anyAccount(db);
}
