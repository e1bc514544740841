import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type * as z from "zod/mini";
import {
  changeAccount,
  changeInstallationSettings,
  type InstallationSettings,
  inviteAccount,
  listAccounts,
  listMails,
  readInstallation,
  readInstallationSettings,
  readMail,
  sendMailAgain,
  sendReset,
  withdrawAccountInvitation,
  type OwnedAccount,
} from "#shared/api/installation.ts";
import { call, callVersioned, type Versioned } from "../../api/call.ts";
import { sessionKey, surveysKey } from "../../api/keys.ts";

export type MailState = NonNullable<z.output<typeof listMails.query>["state"]>;

const installationKey = ["installation"] as const;
const accountsKey = [...installationKey, "accounts"] as const;
const settingsKey = [...installationKey, "settings"] as const;
const mailsKey = [...installationKey, "mails"] as const;
const aboutKey = [...installationKey, "about"] as const;

export function useInstallation() {
  return useQuery({ queryKey: aboutKey, queryFn: ({ signal }) => call(readInstallation, { signal }) });
}

export function useAccounts() {
  return useQuery({ queryKey: accountsKey, queryFn: ({ signal }) => call(listAccounts, { signal }) });
}

/** What was invited or changed may have written a mail, and the list of surveys tells owners of mails. */
function useMailsStale() {
  const queries = useQueryClient();
  return () => {
    void queries.invalidateQueries({ queryKey: mailsKey });
    void queries.invalidateQueries({ queryKey: aboutKey });
    void queries.invalidateQueries({ queryKey: surveysKey });
  };
}

export function useInviteAccount() {
  const queries = useQueryClient();
  const mailsStale = useMailsStale();
  return useMutation({
    meta: { keeps: true },
    mutationFn: (body: z.input<typeof inviteAccount.body>) => call(inviteAccount, { body }),
    onSuccess: (answer) => {
      queries.setQueryData(accountsKey, answer);
      mailsStale();
    },
  });
}

export function useWithdrawInvitation() {
  const queries = useQueryClient();
  const mailsStale = useMailsStale();
  return useMutation({
    meta: { keeps: true },
    mutationFn: (invitationId: string) => call(withdrawAccountInvitation, { params: { invitationId } }),
    onSuccess: (answer) => {
      queries.setQueryData(accountsKey, answer);
      mailsStale();
    },
  });
}

export function useChangeAccount() {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: ({ account, ...change }: { account: OwnedAccount; isOwner: boolean; closed: boolean }) => {
      const seen = { isOwner: account.isOwner, closed: account.closedAt !== null };
      return call(changeAccount, { params: { accountId: account.id }, body: { ...change, seen } });
    },
    onError: () => void queries.invalidateQueries({ queryKey: accountsKey }),
    onSuccess: (answer) => {
      queries.setQueryData(accountsKey, answer);
      // Whoever gave up being an owner is told of it by their session.
      void queries.invalidateQueries({ queryKey: sessionKey });
    },
  });
}

export function useSendReset() {
  const mailsStale = useMailsStale();
  return useMutation({
    mutationFn: (accountId: string) => call(sendReset, { params: { accountId } }),
    onSuccess: mailsStale,
  });
}

export function useMails(state: MailState | null) {
  return useInfiniteQuery({
    queryKey: [...mailsKey, state ?? "all"],
    initialPageParam: null as string | null,
    queryFn: ({ pageParam, signal }) =>
      call(listMails, {
        query: { ...(pageParam !== null && { before: pageParam }), ...(state !== null && { state }) },
        signal,
      }),
    getNextPageParam: ({ mails, more }) => (more ? (mails.at(-1)?.id ?? null) : null),
    select: ({ pages }) => pages.flatMap((page) => page.mails),
  });
}

export function useMail(mailId: string) {
  return useQuery({
    queryKey: [...mailsKey, "one", mailId],
    queryFn: ({ signal }) => call(readMail, { params: { mailId }, signal }),
  });
}

export function useSendMailAgain() {
  const mailsStale = useMailsStale();
  return useMutation({
    mutationFn: (mailId: string) => call(sendMailAgain, { params: { mailId } }),
    onSuccess: mailsStale,
  });
}

export function useInstallationSettings() {
  return useQuery({
    queryKey: settingsKey,
    queryFn: ({ signal }) => callVersioned(readInstallationSettings, { signal }),
  });
}

export function useChangeInstallationSettings() {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: ({ value: body, version }: Versioned<InstallationSettings>) =>
      callVersioned(changeInstallationSettings, { body, version }),
    onSuccess: (kept) => {
      queries.setQueryData(settingsKey, kept);
      void queries.invalidateQueries({ queryKey: sessionKey });
      void queries.invalidateQueries({ queryKey: surveysKey });
    },
  });
}
