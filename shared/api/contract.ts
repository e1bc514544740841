import type * as z from "zod/mini";
import type { Action } from "#shared/access/table.ts";

/** Who may call an endpoint: an action of the access table, or somebody signed in, the owner, anybody. */
export type Guard = Action | "public" | "signed-in" | "owner";

/** What comes back: JSON by a schema, or bytes of one of the named media types. */
export type Answer<R extends z.core.$ZodType = z.core.$ZodType> =
  { readonly kind: "json"; readonly schema: R } | { readonly kind: "stream"; readonly types: readonly string[] };

/** A file that comes as multipart/form-data under `field`; the other fields are the body (JSON text in a field `body`). */
export interface Upload {
  readonly field: string;
  readonly maxBytes: number;
}

/** One endpoint, described once: the server mounts it, the client calls it, neither repeats its types. */
export interface Contract<
  P extends z.core.$ZodType = z.core.$ZodType,
  Q extends z.core.$ZodType = z.core.$ZodType,
  B extends z.core.$ZodType = z.core.$ZodType,
  A extends Answer = Answer,
> {
  readonly name: string;
  readonly method: "GET" | "POST" | "PUT" | "DELETE";
  readonly path: `/${string}`;
  readonly guard: Guard;
  readonly summary: string;
  readonly params: P;
  readonly query: Q;
  readonly body: B;
  readonly answer: A;
  readonly upload?: Upload;
  /**
   * Two people may edit it: a GET answers with an ETag, any other method needs If-Match with the version that was seen, and is
   * refused with the current one where that is another.
   */
  readonly versioned?: true;
  /** May also be done to a survey that is archived; reading always may. */
  readonly whenArchived?: true;
}

export function json<R extends z.core.$ZodType>(schema: R): { readonly kind: "json"; readonly schema: R } {
  return { kind: "json", schema };
}

export function stream(...types: string[]): { readonly kind: "stream"; readonly types: readonly string[] } {
  return { kind: "stream", types };
}

export function contract<
  P extends z.core.$ZodType,
  Q extends z.core.$ZodType,
  B extends z.core.$ZodType,
  A extends Answer,
>(description: Contract<P, Q, B, A>): Contract<P, Q, B, A> {
  return description;
}
