import type { ReactNode } from "react";
import type { Invitation } from "#shared/api/people.ts";
import { Button } from "../../../components/ui/Button.tsx";
import { Refusal } from "../../../components/ui/Refusal.tsx";
import { showToast } from "../../../components/ui/show-toast.tsx";
import { Table } from "../../../components/ui/Table.tsx";
import { useTimes } from "../../../components/ui/use-times.ts";
import { useRenewInvitation, useWithdrawInvitation } from "./queries.ts";

interface InvitationTableProps {
  readonly surveyId: string;
  readonly invitations: readonly Invitation[];
  readonly mayChange: boolean;
  /** The page with the mails, for an owner; others are told who sees it. */
  readonly mails: ReactNode;
}

const MAIL_WORDS: Readonly<Record<Invitation["mail"], string>> = {
  waiting: "on its way",
  sent: "sent",
  kept: "kept here",
  failed: "not delivered",
};

/** Who is invited and has not answered yet. */
export function InvitationTable({ surveyId, invitations, mayChange, mails }: InvitationTableProps) {
  const times = useTimes();
  const renew = useRenewInvitation(surveyId);
  const withdraw = useWithdrawInvitation(surveyId);
  const isStuck = invitations.some(({ mail, expired }) => !expired && (mail === "kept" || mail === "failed"));
  return (
    <div className="grid gap-3">
      {renew.isError && <Refusal error={renew.error} />}
      {withdraw.isError && <Refusal error={withdraw.error} />}
      <Table caption="Invitations that nobody has accepted yet" sticky>
        <thead>
          <tr>
            <th scope="col">E-mail</th>
            <th scope="col">Role</th>
            <th scope="col">Mail</th>
            <th scope="col">Works until</th>
            <th scope="col">Invited by</th>
            {mayChange && (
              <th scope="col">
                <span className="sr-only">Change</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {invitations.map(({ id, email, role, mail, expired, expiresAt, invitedBy }) => (
            <tr key={id} data-tone={expired || mail === "failed" ? "attention" : undefined}>
              <th scope="row">{email}</th>
              <td>{role}</td>
              <td>{MAIL_WORDS[mail]}</td>
              <td className="whitespace-nowrap">{`${expired ? "expired on " : ""}${times.day(expiresAt)}`}</td>
              <td>{invitedBy}</td>
              {mayChange && (
                <td>
                  <span className="flex gap-2 whitespace-nowrap">
                    <Button
                      size="small"
                      aria-label={`Send ${email} a new link as ${role}`}
                      busy={renew.isPending && renew.variables === id}
                      busyLabel="Sending…"
                      onClick={() =>
                        renew.mutate(id, {
                          onSuccess: () => showToast(`A new link goes to ${email}; the one before has ended.`),
                        })
                      }
                    >
                      New link
                    </Button>
                    <Button
                      size="small"
                      variant="danger"
                      aria-label={`Withdraw the invitation of ${email} as ${role}`}
                      busy={withdraw.isPending && withdraw.variables === id}
                      busyLabel="Withdrawing…"
                      onClick={() =>
                        withdraw.mutate(id, { onSuccess: () => showToast(`The invitation of ${email} has ended.`) })
                      }
                    >
                      Withdraw
                    </Button>
                  </span>
                </td>
              )}
            </tr>
          ))}
        </tbody>
      </Table>
      {isStuck && <p className="q-help">A mail that was not sent is kept to be read and forwarded: {mails}</p>}
      {mayChange && <p className="q-help">A new link is good for 14 days and ends the one before.</p>}
    </div>
  );
}
