import { queryOptions, useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { readSession, signIn, signOut, type Session } from "#shared/api/accounts.ts";
import { call } from "../../api/call.ts";
import { sessionKey } from "../../api/keys.ts";

const sessionQuery = queryOptions({
  queryKey: sessionKey,
  queryFn: ({ signal }) => call(readSession, { signal }),
  staleTime: 60_000,
});

export function useSession() {
  return useQuery(sessionQuery);
}

/** Another person's answers must not stay, nor when they last kept something: all that was asked or done before is dropped. */
function useNewSession() {
  const queries = useQueryClient();
  return (session: Session) => {
    const acts = queries.getMutationCache();
    for (const act of acts.findAll({ predicate: ({ meta }) => meta?.keeps === true })) acts.remove(act);
    queries.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== sessionKey[0] });
    queries.setQueryData(sessionKey, session);
  };
}

export function useSignIn() {
  const begin = useNewSession();
  return useMutation({
    mutationFn: (body: { email: string; password: string }) => call(signIn, { body }),
    onSuccess: begin,
  });
}

export function useSignOut() {
  const begin = useNewSession();
  return useMutation({ mutationFn: () => call(signOut), onSuccess: begin });
}
