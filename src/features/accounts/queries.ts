import {
  queryOptions,
  skipToken,
  useMutation,
  useQuery,
  useQueryClient,
  type QueryClient,
  type UseMutationResult,
} from "@tanstack/react-query";
import { readSession, signIn, signOut, type Session } from "#shared/api/accounts.ts";
import { call } from "../../api/call.ts";
import { hasLeftKey, sessionKey } from "../../api/keys.ts";

export interface Credentials {
  readonly email: string;
  readonly password: string;
}
export type SignIn = UseMutationResult<Session, Error, Credentials>;

const sessionQuery = queryOptions({
  queryKey: sessionKey,
  queryFn: async ({ signal, client }) => {
    const before = client.getQueryData<Session>(sessionKey)?.account;
    const session = await call(readSession, { signal });
    // Signed in as somebody else in another window of this browser.
    if (before != null && session.account !== null && session.account.id !== before.id) forgetAnswers(client);
    return session;
  },
  staleTime: 60_000,
});

export function useSession() {
  return useQuery(sessionQuery);
}

/** Whether there is no session here because somebody signed out. */
export function useHasLeft(): boolean {
  return useQuery<boolean>({ queryKey: hasLeftKey, queryFn: skipToken }).data === true;
}

/** Another person's answers must not stay, nor when they last kept something: all that was asked or done before is dropped. */
function forgetAnswers(queries: QueryClient): void {
  const acts = queries.getMutationCache();
  for (const act of acts.findAll({ predicate: ({ meta }) => meta?.keeps === true })) acts.remove(act);
  queries.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== sessionKey[0] });
}

/** What follows when somebody came in or went out by an act of their own. */
export function useNewSession(): (session: Session) => void {
  const queries = useQueryClient();
  return (session) => {
    queries.setQueryData(hasLeftKey, session.account === null);
    forgetAnswers(queries);
    queries.setQueryData(sessionKey, session);
  };
}

export function useSignIn(): SignIn {
  const begin = useNewSession();
  return useMutation({ mutationFn: (body: Credentials) => call(signIn, { body }), onSuccess: begin });
}

/** Signing in over a page whose session ended: the same person goes on with all that is there, anybody else begins anew. */
export function useSignInAgain(accountId: string): SignIn {
  const begin = useNewSession();
  const queries = useQueryClient();
  return useMutation({
    mutationFn: (body: Credentials) => call(signIn, { body }),
    onSuccess: (session) => {
      if (session.account?.id !== accountId) {
        begin(session);
        return;
      }
      queries.setQueryData(sessionKey, session);
      void queries.invalidateQueries({ predicate: ({ queryKey }) => queryKey[0] !== sessionKey[0] });
    },
  });
}

export function useSignOut() {
  const begin = useNewSession();
  return useMutation({ mutationFn: () => call(signOut), onSuccess: begin });
}
