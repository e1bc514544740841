import { MutationCache, QueryCache, QueryClient } from "@tanstack/react-query";
import type { Session } from "#shared/api/accounts.ts";
import { Problem } from "#shared/problem.ts";
import { sessionKey } from "./keys.ts";

declare module "@tanstack/react-query" {
  interface Register {
    defaultError: Error;
    mutationMeta: {
      /** This act keeps something: the header shows when it last did. */
      keeps?: boolean;
    };
  }
}

const RETRIES = 2;

/** Answers are kept for a while, refusals are not asked again, and a session that ended is known to the page, which asks to sign in again. */
export function makeQueryClient(): QueryClient {
  const onError = (error: Error) => {
    if (error instanceof Problem && error.code === "not-signed-in") {
      client.setQueryData<Session>(sessionKey, (session) =>
        session === undefined ? undefined : { ...session, account: null },
      );
    }
  };
  const client = new QueryClient({
    queryCache: new QueryCache({ onError }),
    mutationCache: new MutationCache({ onError }),
    defaultOptions: {
      queries: {
        networkMode: "always",
        staleTime: 15_000,
        retry: (failures, error) => error instanceof Problem && error.code === "unreachable" && failures < RETRIES,
        retryDelay: (failures) => 500 * (failures + 1),
      },
      mutations: { networkMode: "always" },
    },
  });
  return client;
}
