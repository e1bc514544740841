import { randomBytes } from "node:crypto";
import { existsSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import type { Env } from "./env.ts";

interface Secrets {
  readonly sessionSecret: string;
  readonly signingKey: string;
}

/** Session secret and signing key: from the environment, else from files beside the database, made at the first start. */
export function readSecrets(env: Env): Secrets {
  mkdirSync(env.dataFolder, { recursive: true, mode: 0o700 }); // counts, passwords' hashes and keys: nobody else's
  return {
    sessionSecret: env.sessionSecret ?? kept(join(env.dataFolder, "session-secret")),
    signingKey: env.signingKey ?? kept(signingKeyFile(env)),
  };
}

export function signingKeyFile(env: Pick<Env, "dataFolder">): string {
  return join(env.dataFolder, "signing-key");
}

function kept(file: string): string {
  if (!existsSync(file)) writeFileSync(file, randomBytes(32).toString("hex"), { mode: 0o600, flag: "wx" });
  const text = readFileSync(file, "utf8").trim();
  if (!/^[0-9a-f]{64}$/.test(text)) throw new Error(`${file} does not hold 64 hexadecimal characters`);
  return text;
}
