import { randomBytes } from "node:crypto";
import { createInterface } from "node:readline/promises";
import { join } from "node:path";
import { z } from "zod";
import { closeDb, openDb } from "../db/open.ts";
import { readEnv } from "../env.ts";
import { projectRoot } from "../project.ts";
import { readSecrets } from "../secrets.ts";
import { createAccount } from "../services/create-account.ts";
import { needed, options, printJson, sayError, UsageError } from "./usage.ts";

const KNOWN = {
  email: { type: "string" },
  name: { type: "string" },
  password: { type: "string" },
} as const;

/**
 * `quillet create-owner`: an account of an owner in the data folder of the environment. Without --password it asks at a
 * terminal; where there is none, or the answer is empty, it makes one and prints it. The demo has accounts of its own: there it
 * is refused.
 */
export async function createOwner(args: readonly string[]): Promise<number> {
  const { values } = options(args, KNOWN, 0);
  const email = needed(values.email, "--email");
  if (!z.email().safeParse(email).success) throw new UsageError(`--email is not an e-mail address: "${email}".`);
  const env = readEnv(process.env, projectRoot());
  if (env.demo) {
    sayError("No owner was made: this would be the demo. Set QUILLET_DATA to the folder of your data, then try again.");
    return 1;
  }
  const name = values.name ?? email.replace(/@.*/, "");
  const typed = values.password ?? (await askPassword());
  const password = typed === "" ? madePassword() : typed;
  readSecrets(env); // makes the folder
  const db = openDb(env.databaseFile);
  try {
    await createAccount(
      { db, now: () => new Date(), random: (bytes) => randomBytes(bytes) },
      { email, name, password, isOwner: true },
    );
  } finally {
    closeDb(db);
  }
  printJson({
    email: email.toLowerCase(),
    name,
    database: join(env.databaseFile),
    ...(typed === "" ? { password } : {}),
  });
  return 0;
}

async function askPassword(): Promise<string> {
  if (!process.stdin.isTTY) return "";
  const terminal = createInterface({ input: process.stdin, output: process.stderr });
  try {
    return (await terminal.question("Password (at least 12 characters; empty: one is made): ")).trim();
  } finally {
    terminal.close();
  }
}

/** 96 bits in four groups of letters and digits. */
export function madePassword(): string {
  const groups = randomBytes(12).toString("hex").match(/.{6}/g) ?? [];
  if (groups.length !== 4) sayError("a password was cut");
  return groups.join("-");
}
