/** Long rather than complicated: length is what counts against guessing. In code points. */
export const SHORTEST_PASSWORD = 12;

/** The rule in words, for the form and for the refusal. That none of the common ones is taken, only the server can say. */
export const PASSWORD_RULE = `Use at least ${SHORTEST_PASSWORD} characters; a sentence is fine.`;

export function isPasswordTooShort(password: string): boolean {
  return Array.from(password).length < SHORTEST_PASSWORD;
}
