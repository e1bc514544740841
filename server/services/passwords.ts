import { hash, verify } from "@node-rs/argon2";
import { Problem } from "#shared/problem.ts";

/** Long rather than complicated: length is what counts against guessing. */
export const SHORTEST_PASSWORD = 12;

/** argon2id with the package's defaults (19 MiB, 2 passes). Throws "password-too-short". */
export async function hashPassword(password: string): Promise<string> {
  if (Array.from(password).length < SHORTEST_PASSWORD) {
    throw new Problem("password-too-short", `Use at least ${SHORTEST_PASSWORD} characters; a sentence is fine.`);
  }
  return hash(password);
}

export async function passwordFits(passwordHash: string, password: string): Promise<boolean> {
  return verify(passwordHash, password);
}
