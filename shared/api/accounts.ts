import * as z from "zod/mini";
import { email, id, none } from "#shared/api/common.ts";
import { contract, json } from "#shared/api/contract.ts";

export const account = z.object({ id, name: z.string(), email: z.string(), isOwner: z.boolean() });
export type Account = z.infer<typeof account>;

/** Who is signed in, and on what kind of installation: the demo says so on every page. */
export const session = z.object({
  account: z.nullable(account),
  demo: z.boolean(),
  version: z.string(),
  /** An XYZ template and whom it names, for those who are signed in; null for none. */
  baseMap: z.nullable(z.object({ url: z.string(), attribution: z.string() })),
});
export type Session = z.infer<typeof session>;

export const readSession = contract({
  name: "readSession",
  method: "GET",
  path: "/api/session",
  guard: "public",
  summary: "Who is signed in",
  params: none,
  query: none,
  body: none,
  answer: json(session),
});

export const signIn = contract({
  name: "signIn",
  method: "POST",
  path: "/api/session",
  guard: "public",
  summary: "Sign in with an e-mail address and a password",
  params: none,
  query: none,
  body: z.object({ email, password: z.string().check(z.minLength(1), z.maxLength(1000)) }),
  answer: json(session),
});

export const signOut = contract({
  name: "signOut",
  method: "DELETE",
  path: "/api/session",
  guard: "signed-in",
  summary: "End this session",
  params: none,
  query: none,
  body: none,
  answer: json(session),
});
