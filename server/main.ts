import { randomBytes } from "node:crypto";
import { existsSync } from "node:fs";
import type { AddressInfo } from "node:net";
import { join } from "node:path";
import { pino } from "pino";
import { createApp } from "./app.ts";
import type { Platform } from "./context.ts";
import { anyAccount } from "./db/accounts.ts";
import { closeDb, openDb } from "./db/open.ts";
import { demoTable, ensureDemo } from "./demo.ts";
import { readEnv } from "./env.ts";
import { startJobs } from "./jobs/jobs.ts";
import { projectRoot, version } from "./project.ts";
import { readSecrets } from "./secrets.ts";
import { createAccount } from "./services/create-account.ts";

/** Environment, database, server, and an orderly stop: open, listen, print where, close. */
async function main(): Promise<void> {
  const root = projectRoot();
  const env = readEnv(process.env, root);
  const secrets = readSecrets(env);
  const jobs = startJobs();
  const demo = await ensureDemo(env, { jobs, signingKey: secrets.signingKey, version: version(root) });
  const db = openDb(env.databaseFile);
  const platform: Platform = {
    db,
    jobs,
    now: () => new Date(),
    random: (bytes) => randomBytes(bytes),
    signingKey: secrets.signingKey,
    log: pino({ level: env.logLevel }),
    demo: env.demo,
    version: version(root),
  };
  if (env.owner && !anyAccount(db)) await createAccount(platform, { ...env.owner, isOwner: true });

  const clientFolder = join(root, "dist", "client");
  const app = createApp(platform, {
    sessionSecret: secrets.sessionSecret,
    https: env.https,
    clientFolder: existsSync(clientFolder) ? clientFolder : null,
    signInsPerMinute: 20,
  });
  const server = app.listen(env.port, env.host, (error?: Error) => {
    if (error !== undefined) {
      process.stderr.write(`Quillet cannot listen at ${env.host}:${env.port}: ${error.message}. Set QUILLET_PORT.\n`);
      process.exitCode = 1;
      void jobs.close().then(() => closeDb(db));
      return;
    }
    const { port } = server.address() as AddressInfo;
    say(`Quillet is at http://${env.host}:${port}/`);
    if (demo) say(demoTable(demo, `http://${env.host}:${port}/`));
    if (!env.demo && !anyAccount(db)) {
      const command = "npm run -s quillet -- create-owner --email YOU@EXAMPLE.ORG";
      say(`There is no account yet. Make the first owner: QUILLET_DATA=${env.dataFolder} ${command}`);
    }
  });
  const stop = () => {
    server.close(() => {
      void jobs.close().then(() => closeDb(db));
    });
    server.closeIdleConnections();
  };
  process.once("SIGINT", stop);
  process.once("SIGTERM", stop);
}

function say(line: string): void {
  process.stdout.write(`${line}\n`);
}

await main();
