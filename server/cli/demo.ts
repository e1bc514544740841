import { demoTable, ensureDemo, forgetDemo } from "../demo.ts";
import { readEnv } from "../env.ts";
import { startJobs } from "../jobs/jobs.ts";
import { projectRoot, version } from "../project.ts";
import { readSecrets } from "../secrets.ts";
import { options, sayError, UsageError } from "./usage.ts";

/** `quillet demo`: makes the demo anew, with new passwords, and prints its accounts. */
export async function demo(args: readonly string[]): Promise<number> {
  options(args, {}, 0);
  const root = projectRoot();
  const env = readEnv(process.env, root);
  if (!env.demo)
    throw new UsageError("This is a real installation (QUILLET_DATA or QUILLET_DEMO=0): it is never filled.");
  const { signingKey } = readSecrets(env);
  const jobs = startJobs();
  try {
    forgetDemo(env);
    const accounts = await ensureDemo(env, { jobs, signingKey, version: version(root) });
    sayError(`A server that runs on ${env.databaseFile} must be started again.`);
    process.stdout.write(demoTable(accounts ?? [], `http://${env.host}:${env.port}/`));
  } finally {
    await jobs.close();
  }
  return 0;
}
