import { hash, verify } from "@node-rs/argon2";
import { isPasswordTooShort, PASSWORD_RULE } from "#shared/access/password-rules.ts";
import { Problem } from "#shared/problem.ts";
import { isCommonPassword } from "./common-passwords.ts";

/** Whose password it is: their own name and address are the first that are tried. */
interface Person {
  readonly name: string;
  readonly email: string;
}

/**
 * The hash of a password that somebody chose, by the rules; argon2id with the package's defaults (19 MiB, 2 passes). Every
 * place where a password is set calls this.
 * @throws Problem `password-too-short`, `password-common`
 */
export async function hashNewPassword(password: string, person: Person): Promise<string> {
  if (isPasswordTooShort(password)) throw new Problem("password-too-short", PASSWORD_RULE);
  if (await isCommonPassword(password, ownWords(person))) {
    throw new Problem("password-common", "Take another: a few words that do not belong together make a good one.");
  }
  return hash(password);
}

/** A hash that no password fits, so that an unknown address takes as long to refuse as a wrong password. */
export async function decoyHash(random: (bytes: number) => Uint8Array): Promise<string> {
  return hash(Buffer.from(random(24)).toString("hex"));
}

export async function passwordFits(passwordHash: string, password: string): Promise<boolean> {
  return verify(passwordHash, password);
}

function ownWords({ name, email }: Person): string[] {
  const local = email.replace(/@.*/, "");
  return [email, local, name, name.replace(/\s+/g, ""), ...name.split(/\s+/), ...local.split(/[._+-]/)];
}
