import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type { Session } from "#shared/api/accounts.ts";
import { changeName, changePassword, endOtherSessions, endSession, listSessions } from "#shared/api/people.ts";
import { call } from "../../api/call.ts";
import { accountKey, sessionKey } from "../../api/keys.ts";

const sessionsKey = [...accountKey, "sessions"];

export function useChangeName() {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: (name: string) => call(changeName, { body: { name } }),
    onSuccess: (account) => {
      queries.setQueryData<Session>(sessionKey, (session) => session && { ...session, account });
      // Every list of people and every record tells the name.
      void queries.invalidateQueries({ predicate: ({ queryKey }) => queryKey[0] === "survey" });
    },
  });
}

export function useChangePassword() {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: (body: { current: string; next: string }) => call(changePassword, { body }),
    onSuccess: (session) => {
      queries.setQueryData(sessionKey, session);
      void queries.invalidateQueries({ queryKey: sessionsKey });
    },
  });
}

export function useSessions() {
  return useQuery({
    queryKey: sessionsKey,
    queryFn: ({ signal }) => call(listSessions, { signal }),
    select: ({ sessions }) => sessions,
  });
}

/** Ends one of one's sessions by its handle, or with null all others. */
export function useEndSessions() {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: (handle: string | null) =>
      handle === null ? call(endOtherSessions) : call(endSession, { params: { handle } }),
    onSuccess: (answer) => {
      queries.setQueryData(sessionsKey, answer);
    },
    // Ended meanwhile: the list says so better than the refusal.
    onError: () => void queries.invalidateQueries({ queryKey: sessionsKey }),
  });
}
