import { resolve } from "node:path";
import { readEnv } from "../env.ts";
import { projectRoot, version } from "../project.ts";
import { readSecrets, signingKeyFile } from "../secrets.ts";
import { restoreBackup } from "../services/restore-backup.ts";
import { options, printJson, UsageError } from "./usage.ts";

/** `quillet restore FILE`: puts a backup in the place of the database, once it is found whole. */
export function restore(args: readonly string[]): number {
  const { positionals } = options(args, {}, 1);
  const [path] = positionals;
  if (path === undefined) throw new UsageError("Name the backup: quillet restore FILE");
  const root = projectRoot();
  const env = readEnv(process.env, root);
  readSecrets(env); // makes the folder
  const restored = restoreBackup(resolve(path), {
    databaseFile: env.databaseFile,
    signingKeyFile: signingKeyFile(env),
    signingKeyGiven: env.signingKey,
    version: version(root),
    now: () => new Date(),
  });
  printJson({ database: env.databaseFile, ...restored });
  return 0;
}
