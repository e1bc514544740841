import { useMutation, useQuery } from "@tanstack/react-query";
import {
  acceptInvitation,
  readInvitation,
  readReset,
  requestReset,
  useReset as setPasswordByLink,
} from "#shared/api/people.ts";
import { Problem } from "#shared/problem.ts";
import { call } from "../../api/call.ts";
import { useNewSession } from "./queries.ts";

/** What a link is to is asked once: it may end while the page is open, and then the act says so. */
const asked = { staleTime: Infinity, gcTime: 0, refetchOnWindowFocus: false } as const;

export function useInvitation(secret: string) {
  return useQuery({
    queryKey: ["session", "invitation", secret],
    queryFn: ({ signal }) => call(readInvitation, { params: { secret }, signal }).catch(inWords),
    ...asked,
  });
}

export interface Accepting {
  readonly name?: string;
  readonly password: string;
}

export function useAcceptInvitation(secret: string) {
  const begin = useNewSession();
  return useMutation({
    mutationFn: (body: Accepting) => call(acceptInvitation, { params: { secret }, body }),
    onSuccess: ({ session }) => begin(session),
  });
}

export function useRequestReset() {
  return useMutation({ mutationFn: (email: string) => call(requestReset, { body: { email } }) });
}

export function useResetLink(secret: string) {
  return useQuery({
    queryKey: ["session", "reset", secret],
    queryFn: ({ signal }) => call(readReset, { params: { secret }, signal }).catch(inWords),
    ...asked,
  });
}

export function useSetPasswordByLink(secret: string) {
  const begin = useNewSession();
  return useMutation({
    mutationFn: (password: string) => call(setPasswordByLink, { params: { secret }, body: { password } }),
    onSuccess: begin,
  });
}

/** An address that was cut off in the mail is no link at all to the server. */
function inWords(error: unknown): never {
  if (error instanceof Problem && (error.code === "input-invalid" || error.code === "not-found")) {
    throw new Problem("link-ended", "A part of the address is missing. Press the link in the mail, or copy all of it.");
  }
  throw error;
}
