import { isPasswordTooShort, PASSWORD_RULE } from "#shared/access/password-rules.ts";
import { Problem } from "#shared/problem.ts";

/** Told before anything is typed. */
export const NEW_PASSWORD_HELP = `${PASSWORD_RULE} One of the common ones is refused.`;

/** What a new password lacks as far as this page can tell; null for nothing. */
export function lackOf(password: string): string | null {
  if (password === "") return `Choose a password. ${PASSWORD_RULE}`;
  return isPasswordTooShort(password) ? PASSWORD_RULE : null;
}

/** A refusal of the password that was sent, to be shown beside its field; null for any other failure. */
export function passwordRefusal(error: Error | null): string | null {
  if (!(error instanceof Problem)) return null;
  const isOfPassword = error.code === "password-too-short" || error.code === "password-common";
  return isOfPassword ? `${error.title}. ${error.message}` : null;
}
