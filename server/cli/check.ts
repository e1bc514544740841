import { existsSync } from "node:fs";
import { Problem } from "#shared/problem.ts";
import { closeDb, missingTriggers, openDb } from "../db/open.ts";
import { readEnv } from "../env.ts";
import { projectRoot, version } from "../project.ts";
import { readSecrets } from "../secrets.ts";
import { checkInstallation } from "../services/check-installation.ts";
import { options, printJson } from "./usage.ts";

/** `quillet check`: walks database, chains and signatures, and replays every survey; status 1 where something is not whole. */
export function check(args: readonly string[]): number {
  options(args, {}, 0);
  const root = projectRoot();
  const env = readEnv(process.env, root);
  if (!existsSync(env.databaseFile)) {
    throw new Problem(
      "database-missing",
      `${env.databaseFile} is not there. Set QUILLET_DATA to the folder of your data.`,
    );
  }
  const { signingKey } = readSecrets(env);
  const missing = missingTriggers(env.databaseFile);
  const db = openDb(env.databaseFile);
  try {
    const result = checkInstallation({ db, signingKey, now: () => new Date(), version: version(root) });
    const ok = result.ok && missing.length === 0;
    printJson({ ...result, ok, missingTriggers: missing });
    return ok ? 0 : 1;
  } finally {
    closeDb(db);
  }
}
