import { randomBytes } from "node:crypto";
import { existsSync } from "node:fs";
import type { AddressInfo } from "node:net";
import { join } from "node:path";
import { pino } from "pino";
import { Problem } from "#shared/problem.ts";
import { createApp } from "./app.ts";
import type { Platform } from "./context.ts";
import { anyAccount } from "./db/accounts.ts";
import { lockForServing } from "./db/lock.ts";
import { closeDb, openDb } from "./db/open.ts";
import { demoTable, ensureDemo } from "./demo.ts";
import { type Env, readEnv } from "./env.ts";
import { openSmtp } from "./mail/smtp.ts";
import { startJobs } from "./jobs/jobs.ts";
import { projectRoot, version } from "./project.ts";
import { type Round, startRounds } from "./rounds.ts";
import { readSecrets } from "./secrets.ts";
import { createAccount } from "./services/create-account.ts";
import { sendQueue } from "./mail/send-queue.ts";
import { dailyBackupRound } from "./services/daily-backup.ts";
import { forgetEnded } from "./services/end-sessions.ts";
import { tellCountDays } from "./services/tell-count-days.ts";

/** Environment, database, server, and an orderly stop: open, listen, print where, close. */
async function main(): Promise<void> {
  const root = projectRoot();
  const env = readEnv(process.env, root);
  const secrets = readSecrets(env);
  const unlock = lockForServing(env.databaseFile);
  const jobs = startJobs();
  const demo = await ensureDemo(env, { jobs, signingKey: secrets.signingKey, version: version(root) });
  const db = openDb(env.databaseFile);
  let ownAddress = `http://${env.host}:${env.port}`;
  const platform: Platform = {
    db,
    jobs,
    mail: env.smtp && openSmtp(env.smtp.url, env.smtp.from),
    ownAddress: () => ownAddress,
    dailyCopies: env.demo ? null : { folder: join(env.dataFolder, "backups"), lastError: null },
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
  const endRounds = startRounds(roundsOf(platform, env), platform.log);
  const end = async (): Promise<void> => {
    await endRounds();
    platform.mail?.close();
    await jobs.close();
    closeDb(db);
    unlock();
  };
  const server = app.listen(env.port, env.host, (error?: Error) => {
    if (error !== undefined) {
      process.stderr.write(`Quillet cannot listen at ${env.host}:${env.port}: ${error.message}. Set QUILLET_PORT.\n`);
      process.exitCode = 1;
      void end();
      return;
    }
    ownAddress = `http://${env.host}:${(server.address() as AddressInfo).port}`;
    say(`Quillet is at ${ownAddress}/`);
    if (demo) say(demoTable(demo, `${ownAddress}/`));
    if (!env.demo && !anyAccount(db)) {
      const command = "npm run -s quillet -- create-owner --email YOU@EXAMPLE.ORG";
      say(`There is no account yet. Make the first owner: QUILLET_DATA=${env.dataFolder} ${command}`);
    }
  });
  const stop = () => {
    server.close(() => void end());
    server.closeIdleConnections();
  };
  process.once("SIGINT", stop);
  process.once("SIGTERM", stop);
}

const MINUTE_MS = 60_000;

/** What this process does beside answering; the demo makes no daily copies. */
function roundsOf(platform: Platform, { databaseFile }: Env): Round[] {
  const rounds: Round[] = [
    { name: "mail", everyMs: MINUTE_MS / 4, work: () => sendQueue(platform) },
    { name: "what signing in needs no more", everyMs: 60 * MINUTE_MS, work: () => forgetEnded(platform) },
    { name: "days with counts", everyMs: 5 * MINUTE_MS, work: () => tellCountDays(platform) },
  ];
  const copies = platform.dailyCopies;
  if (copies) {
    const work = () => dailyBackupRound(platform, copies, databaseFile);
    rounds.push({ name: "daily backup", everyMs: 10 * MINUTE_MS, work });
  }
  return rounds;
}

function say(line: string): void {
  process.stdout.write(`${line}\n`);
}

try {
  await main();
} catch (error) {
  if (!(error instanceof Problem)) throw error;
  process.stderr.write(`Quillet did not start. ${error.title}. ${error.message}\n`);
  process.exit(1);
}
