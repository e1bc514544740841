import { vi } from "vitest";
import * as z from "zod/mini";
import { ALL_CONTRACTS } from "#shared/api/all.ts";
import type { Answer, Contract } from "#shared/api/contract.ts";
import { Problem } from "#shared/problem.ts";

type Schema = z.core.$ZodType;
type AnswerOf<A extends Answer> = A extends { kind: "json"; schema: infer R extends Schema }
  ? z.input<R>
  : string | Uint8Array;

export interface FakeInput {
  readonly params: Readonly<Record<string, string>>;
  readonly query: Readonly<Record<string, string>>;
  readonly body: unknown;
  readonly file: File | null;
  /** The version that the caller saw (If-Match). */
  readonly version: string | null;
}

interface Handler {
  readonly contract: Contract;
  readonly answer: (input: FakeInput) => unknown;
}

export interface FakeCall extends FakeInput {
  readonly name: string;
}

/** A server that answers by contract: what it is sent must fit the contract, what it answers too. Unknown calls are refused. */
export class FakeApi {
  readonly calls: FakeCall[] = [];
  private readonly handlers = new Map<string, Handler>();

  on<P extends Schema, Q extends Schema, B extends Schema, A extends Answer>(
    contract: Contract<P, Q, B, A>,
    answer: (input: Omit<FakeInput, "body"> & { readonly body: z.output<B> }) => AnswerOf<A>,
  ): this {
    this.handlers.set(contract.name, { contract, answer: answer as (input: FakeInput) => unknown });
    return this;
  }

  named(name: string): FakeCall[] {
    return this.calls.filter((call) => call.name === name);
  }

  /** Takes the place of fetch until the test ends. */
  install(): this {
    vi.stubGlobal("fetch", (address: string, init?: RequestInit) => this.fetch(address, init ?? {}));
    return this;
  }

  private async fetch(address: string, init: RequestInit): Promise<Response> {
    const url = new URL(address, "http://quillet.example");
    const method = init.method ?? "GET";
    const found = match(method, url.pathname);
    if (found === null) throw new Error(`no contract for ${method} ${url.pathname}`);
    const { contract, params } = found;
    const { body, file } = await sent(contract, init);
    const parsed = z.parse(contract.body, body);
    const query = Object.fromEntries(url.searchParams);
    const version = new Headers(init.headers).get("if-match");
    const input = { params, query, body: parsed, file, version };
    this.calls.push({ name: contract.name, ...input });
    try {
      const handler = this.handlers.get(contract.name);
      if (handler === undefined) throw new Problem("not-found", `The test has no answer for ${contract.name}.`);
      return answerOf(contract, await handler.answer(input));
    } catch (error) {
      if (!(error instanceof Problem)) throw error;
      const { code, message: detail, status, title, question } = error;
      return Response.json({ code, detail, status, title, question }, { status });
    }
  }
}

/** What two may edit comes with its whole text as its version. */
function answerOf({ answer, versioned }: Contract, value: unknown): Response {
  if (answer.kind === "json") {
    const json = z.parse(answer.schema, value);
    const version = `"${encodeURIComponent(JSON.stringify(json))}"`;
    return Response.json(json, versioned === true ? { headers: { etag: version } } : {});
  }
  return new Response(value as string, { headers: { "content-type": answer.types[0] ?? "" } });
}

/** An answer's version in a test: of use only to be sent back. */
export function versionOf(answer: unknown): string {
  return `"${encodeURIComponent(JSON.stringify(answer))}"`;
}

/** Contracts with a fixed address come before those with a name in it: /frames/draft is no frame id. */
function match(method: string, path: string): { contract: Contract; params: Record<string, string> } | null {
  const found = ALL_CONTRACTS.flatMap((contract) => {
    if (contract.method !== method) return [];
    const names = [...contract.path.matchAll(/:(\w+)/g)].map((one) => one[1] ?? "");
    const values = new RegExp(`^${contract.path.replace(/:\w+/g, "([^/]+)")}$`).exec(path);
    if (values === null) return [];
    const params = Object.fromEntries(names.map((name, i) => [name, decodeURIComponent(values[i + 1] ?? "")]));
    return [{ contract, params }];
  });
  return found.toSorted((a, b) => Object.keys(a.params).length - Object.keys(b.params).length)[0] ?? null;
}

async function sent(contract: Contract, init: RequestInit): Promise<{ body: unknown; file: File | null }> {
  if (contract.upload !== undefined) {
    const form = init.body as FormData;
    const file = form.get(contract.upload.field);
    return { body: JSON.parse(form.get("body") as string), file: file instanceof File ? file : null };
  }
  const text = typeof init.body === "string" ? init.body : "{}";
  return Promise.resolve({ body: JSON.parse(text) as unknown, file: null });
}
