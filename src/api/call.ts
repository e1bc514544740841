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
    /** For versioned writes: the version that was seen. */
    readonly version?: string;
    readonly signal?: AbortSignal | undefined;
  };

/** An answer of a versioned contract, with what names this version of it (its ETag). */
export interface Versioned<T> {
  readonly value: T;
  readonly version: string;
}

interface LooseInput {
  readonly params?: unknown;
  readonly query?: unknown;
  readonly body?: unknown;
  readonly file?: File;
  readonly version?: string;
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
  return answerOf(contract, input ?? {}, await respond(contract, input ?? {}));
}

/**
 * Calls an endpoint that two people may edit: its answer with the version of it, which the next write sends as `version`.
 * Throws RangeError where the answer names no version.
 * @throws Problem as call does; `changed-meanwhile` where `version` is not what stands now (see versionNow)
 */
export async function callVersioned<P extends Schema, Q extends Schema, B extends Schema, A extends Answer>(
  contract: Contract<P, Q, B, A>,
  input: CallInput<P, Q, B>,
): Promise<Versioned<AnswerOf<A>>> {
  const response = await respond(contract, input);
  const version = response.headers.get("etag");
  if (version === null) throw new RangeError(`the answer of ${contract.name} names no version`);
  return { value: await answerOf(contract, input, response), version };
}

/** What stands now, where a versioned write was refused because somebody changed it meanwhile; null for any other failure. */
export function versionNow<A extends Answer>(
  contract: Contract<Schema, Schema, Schema, A>,
  error: unknown,
): Versioned<AnswerOf<A>> | null {
  if (!(error instanceof Problem) || error.code !== "changed-meanwhile") return null;
  const { answer } = contract as { answer: Answer };
  const version = error.question?.["version"];
  if (typeof version !== "string" || answer.kind !== "json") return null;
  return { value: z.parse(answer.schema, error.question?.["current"]) as AnswerOf<A>, version };
}

type Called<A extends Answer> = Contract<Schema, Schema, Schema, A>;

async function respond(contract: Called<Answer>, input: LooseInput): Promise<Response> {
  const address = addressOf(contract, input);
  const response = await send(address, contract, input);
  if (!response.ok) throw await problemOf(response, contract.name);
  return response;
}

async function answerOf<A extends Answer>(
  contract: Called<A>,
  { signal }: LooseInput,
  response: Response,
): Promise<AnswerOf<A>> {
  const { answer } = contract as { answer: Answer };
  if (answer.kind === "stream") return (await body(() => response.blob(), signal)) as AnswerOf<A>;
  const json: unknown = await body(() => response.json(), signal);
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
    init.headers = {
      "content-type": "application/json",
      ...(input.version !== undefined && { "if-match": input.version }),
    };
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
