import { Problem, type ProblemCode, type Question } from "#shared/problem.ts";

/** What comes out of a worker: a refusal loses its code when it is thrown across, so it travels as data. */
export type Outcome<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly code: ProblemCode; readonly detail: string; readonly question?: Question };

/** Inside the worker: runs the work and packs what it gives or refuses. Bugs go across as they are. */
export async function outcomeOf<T>(work: () => T | Promise<T>): Promise<Outcome<T>> {
  try {
    return { ok: true, value: await work() };
  } catch (error) {
    if (!(error instanceof Problem)) throw error;
    const { code, message, question } = error;
    return { ok: false, code, detail: message, ...(question !== undefined && { question }) };
  }
}

/** Outside: the value, or the refusal thrown again. */
export function valueOf<T>(outcome: Outcome<T>): T {
  if (outcome.ok) return outcome.value;
  throw new Problem(outcome.code, outcome.detail, outcome.question);
}
