import * as z from "zod/mini";
import type { Answer, Contract } from "#shared/api/contract.ts";
import { PROBLEMS, Problem, type ProblemCode, type Question } from "#shared/problem.ts";

type Schema = z.core.$ZodType;

/** What a contract answers: its parsed JSON, or the bytes of a stream as a Blob (`.arrayBuffer()`, `.text()`). */
export type AnswerOf<A extends Answer> = A extends { kind: "json"; schema: infer R extends Schema }
  ? z.output<R>
  : A extends { kind: "stream" }
    ? Blob
    : never;

/** One part of the input; it may be left out where its schema takes an empty object. */
type Part<Name extends string, S extends Schema> =
  Record<string, never> extends z.input<S>
    ? { readonly [N in Name]?: z.input<S> }
    : { readonly [N in Name]: z.input<S> };

export type CallInput<P extends Schema, Q extends Schema, B extends Schema> = Part<"params", P> &
  Part<"query", Q> &
  Part<"body", B> & {
    /** For contracts with an upload. */
    readonly file?: File;
    readonly signal?: AbortSignal | undefined;
  };

interface LooseInput {
  readonly params?: unknown;
  readonly query?: unknown;
  readonly body?: unknown;
  readonly file?: File;
  readonly signal?: AbortSignal | undefined;
}

/**
 * The address of an endpoint with its parameters filled in, for links that fetch a file.
 * Throws RangeError where a parameter of the path is missing.
 */
export function addressOf<P extends Schema, Q extends Schema, B extends Schema, A extends Answer>(
  contract: Contract<P, Q, B, A>,
  input: { readonly params?: z.input<P>; readonly query?: z.input<Q> } = {},
): string {
  const path = contract.path.replace(/:(\w+)/g, (_, name: string) => {
    const value = ((input.params ?? {}) as Record<string, unknown>)[name];
    if (typeof value !== "string") throw new RangeError(`${contract.name} needs ${name} in its path`);
    return encodeURIComponent(value);
  });
  const query = new URLSearchParams();
  for (const [name, value] of Object.entries(input.query ?? {})) {
    if (typeof value === "string" || typeof value === "number") query.set(name, String(value));
  }
  return query.size === 0 ? path : `${path}?${query.toString()}`;
}

/**
 * Calls one endpoint and gives back its answer, parsed by the contract's own schema.
 * @throws Problem as the server gave it, with its question; `unreachable` when nothing answers; `cancelled` when the signal ended it.
 */
export async function call<P extends Schema, Q extends Schema, B extends Schema, A extends Answer>(
  contract: Contract<P, Q, B, A>,
  ...[input]: Record<string, never> extends CallInput<P, Q, B>
    ? [input?: CallInput<P, Q, B>]
    : [input: CallInput<P, Q, B>]
): Promise<AnswerOf<A>> {
  const loose = (input ?? {}) as LooseInput;
  const address = addressOf(contract, loose as { params?: z.input<P>; query?: z.input<Q> });
  const response = await send(address, contract, loose);
  if (!response.ok) throw await problemOf(response, contract.name);
  const { answer } = contract as { answer: Answer };
  if (answer.kind === "stream") return (await body(() => response.blob(), loose.signal)) as AnswerOf<A>;
  const json: unknown = await body(() => response.json(), loose.signal);
  return z.parse(answer.schema, json) as AnswerOf<A>;
}

async function send(
  address: string,
  contract: Pick<Contract, "method" | "upload">,
  input: LooseInput,
): Promise<Response> {
  const init: RequestInit = { method: contract.method, credentials: "same-origin" };
  if (input.signal !== undefined) init.signal = input.signal;
  if (contract.upload !== undefined) {
    if (input.file === undefined) throw new RangeError(`no file to send to ${address}`);
    const form = new FormData();
    form.set("body", JSON.stringify(input.body ?? {}));
    form.set(contract.upload.field, input.file, input.file.name);
    init.body = form;
  } else if (contract.method !== "GET") {
    init.headers = { "content-type": "application/json" };
    init.body = JSON.stringify(input.body ?? {});
  }
  return body(() => fetch(address, init), input.signal);
}

/** Something that can be lost on the way: a network failure becomes a refusal with a next step. */
async function body<T>(work: () => Promise<T>, signal: AbortSignal | undefined): Promise<T> {
  try {
    return await work();
  } catch {
    if (signal?.aborted === true) throw new Problem("cancelled", "Nothing more was done.");
    throw new Problem("unreachable", "Check the network, then try again. What you typed is still here.");
  }
}

async function problemOf(response: Response, name: string): Promise<Problem> {
  const told = (await response.json().catch(() => null)) as {
    code?: unknown;
    detail?: unknown;
    question?: unknown;
  } | null;
  const code = told?.code;
  if (typeof code !== "string" || !Object.hasOwn(PROBLEMS, code)) {
    return response.status >= 502 && response.status <= 504
      ? new Problem("unreachable", "Wait a moment, then try again. What you typed is still here.")
      : new Problem(
          "internal",
          `${name} was answered with status ${response.status}. Try again; if it happens again, tell the owner when.`,
        );
  }
  const question = told?.question;
  return new Problem(
    code as ProblemCode,
    typeof told?.detail === "string" ? told.detail : "",
    isQuestion(question) ? question : undefined,
  );
}

function isQuestion(value: unknown): value is Question {
  return typeof value === "object" && value !== null && typeof (value as { kind?: unknown }).kind === "string";
}
