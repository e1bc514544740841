import { useState } from "react";
import type { OwnedAccount } from "#shared/api/installation.ts";
import { Button } from "../../components/ui/Button.tsx";
import { formatCount, formatNumber } from "../../components/ui/format.ts";
import { Menu } from "../../components/ui/Menu.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { Table } from "../../components/ui/Table.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { AccountDialog, type AccountAct } from "./AccountDialog.tsx";
import { InviteAccount } from "./InviteAccount.tsx";
import { OpenInvitations } from "./OpenInvitations.tsx";
import { useAccounts, useChangeAccount, useSendReset } from "./queries.ts";

interface AccountsSectionProps {
  /** Mails are kept here to be forwarded. */
  readonly mailsAreKept: boolean;
}

/** Everybody who has an account, what may be done with each, and who is invited. */
export function AccountsSection({ mailsAreKept }: AccountsSectionProps) {
  const accounts = useAccounts();
  const [asked, setAsked] = useState<AccountAct | null>(null);
  const change = useChangeAccount();
  const reset = useSendReset();
  const sendReset = ({ id, name }: OwnedAccount) => {
    change.reset();
    reset.mutate(id, {
      onSuccess: () =>
        showToast(
          mailsAreKept
            ? `A link for ${name} is written. It lies below, under Mails, to be forwarded; it works for two hours.`
            : `A link for a new password goes to ${name}; it works for two hours.`,
        ),
    });
  };
  const openAgain = (account: OwnedAccount) => {
    reset.reset();
    change.mutate(
      { account, isOwner: account.isOwner, closed: false },
      { onSuccess: () => showToast(`${account.name} can sign in again.`) },
    );
  };
  const failure = change.error ?? reset.error;
  return (
    <Section
      title="Accounts"
      lead={
        accounts.data && `${formatCount(accounts.data.accounts.length, "person has", "people have")} an account here.`
      }
    >
      {accounts.isPending && <RuledLoading label="Loading the accounts" />}
      {accounts.isError && (
        <Refusal error={accounts.error} next={<Button onClick={() => void accounts.refetch()}>Try again</Button>} />
      )}
      {failure !== null && asked === null && <Refusal error={failure} />}
      {accounts.data && (
        <AccountTable
          accounts={accounts.data.accounts}
          onAct={(act) => {
            change.reset();
            reset.reset();
            if (act.kind === "reset") sendReset(act.account);
            else if (act.kind === "open") openAgain(act.account);
            else setAsked(act);
          }}
        />
      )}
      {accounts.data && <OpenInvitations invitations={accounts.data.invitations} />}
      {asked !== null && <AccountDialog act={asked} onClose={() => setAsked(null)} />}
      <InviteAccount mailsAreKept={mailsAreKept} />
    </Section>
  );
}

interface AccountTableProps {
  readonly accounts: readonly OwnedAccount[];
  readonly onAct: (act: AccountAct) => void;
}

function AccountTable({ accounts, onAct }: AccountTableProps) {
  const times = useTimes();
  return (
    <Table caption="Accounts" sticky>
      <thead>
        <tr>
          <th scope="col">Name</th>
          <th scope="col">E-mail</th>
          <th scope="col">Is</th>
          <th scope="col" className="q-num">
            Surveys
          </th>
          <th scope="col">Last here</th>
          <th scope="col">
            <span className="sr-only">What can be done</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {accounts.map((account) => (
          <tr key={account.id}>
            <th scope="row">
              {account.name}
              {account.isSelf && <span className="font-normal text-ink-3"> (you)</span>}
            </th>
            <td>{account.email}</td>
            <td>{standingOf(account, times.day)}</td>
            <td className="q-num">{formatNumber(account.surveys)}</td>
            <td>{account.lastSeenAt === null ? "not yet" : times.recent(account.lastSeenAt)}</td>
            <td className="text-right">
              <Menu
                trigger={
                  <Button size="small" aria-label={`Change ${account.name}`}>
                    Change…
                  </Button>
                }
                items={actsFor(account).map(({ label, kind, danger }) => ({
                  kind: "act",
                  label,
                  danger: danger === true,
                  onSelect: () => onAct({ kind, account }),
                }))}
              />
            </td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

function standingOf({ isOwner, closedAt }: OwnedAccount, day: (iso: string) => string): string {
  if (closedAt !== null) return `closed since ${day(closedAt)}`;
  return isOwner ? "owner" : "member";
}

interface PossibleAct {
  readonly kind: AccountAct["kind"];
  readonly label: string;
  readonly danger?: boolean;
}

function actsFor({ isOwner, closedAt }: OwnedAccount): PossibleAct[] {
  if (closedAt !== null) return [{ kind: "open", label: "Open the account again" }];
  return [
    { kind: "reset", label: "Send a link for a new password" },
    isOwner ? { kind: "no-owner", label: "Take ownership away…" } : { kind: "owner", label: "Make an owner…" },
    { kind: "close", label: "Close the account…", danger: true },
  ];
}
