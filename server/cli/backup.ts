import { dirname, resolve } from "node:path";
import { existsSync, mkdirSync } from "node:fs";
import { Problem } from "#shared/problem.ts";
import { readEnv } from "../env.ts";
import { projectRoot } from "../project.ts";
import { readSecrets } from "../secrets.ts";
import { backUp } from "../services/back-up.ts";
import { options, printJson, UsageError } from "./usage.ts";

/** `quillet backup FILE`: the whole installation in one file, also while it is served. */
export function backup(args: readonly string[]): number {
  const { positionals } = options(args, {}, 1);
  const [path] = positionals;
  if (path === undefined) throw new UsageError("Name the file to write: quillet backup FILE");
  const env = readEnv(process.env, projectRoot());
  if (!existsSync(env.databaseFile)) {
    throw new Problem(
      "database-missing",
      `${env.databaseFile} is not there. Set QUILLET_DATA to the folder of your data.`,
    );
  }
  const file = resolve(path);
  mkdirSync(dirname(file), { recursive: true });
  const madeAt = new Date().toISOString();
  const bytes = backUp({ databaseFile: env.databaseFile, file, signingKey: readSecrets(env).signingKey, madeAt });
  printJson({ file, bytes, madeAt, database: env.databaseFile });
  return 0;
}
