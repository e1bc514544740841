import { Problem } from "#shared/problem.ts";

/** Any failure as a refusal that can be shown: title, fact and next step. What is no Problem is our bug, and said so. */
export function problemOf(error: unknown): Problem {
  if (error instanceof Problem) return error;
  return new Problem(
    "internal",
    `The page met something it did not expect (${error instanceof Error ? error.message : String(error)}). Reload the page; if it happens again, tell the owner when.`,
  );
}
