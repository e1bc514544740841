import type * as z from "zod/mini";
import type { openInvitation } from "#shared/api/installation.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { Table } from "../../components/ui/Table.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { useWithdrawInvitation } from "./queries.ts";

type Invitation = z.output<typeof openInvitation>;

/** Who is invited and has not come; those of a survey are withdrawn on its own page of people. */
export function OpenInvitations({ invitations }: { readonly invitations: readonly Invitation[] }) {
  const times = useTimes();
  const withdraw = useWithdrawInvitation();
  if (invitations.length === 0) return null;
  return (
    <>
      <h3 className="mt-6 mb-2">Invited</h3>
      {withdraw.isError && <Refusal error={withdraw.error} />}
      <Table caption="Invited and not here yet" sticky>
        <thead>
          <tr>
            <th scope="col">E-mail</th>
            <th scope="col">To</th>
            <th scope="col">Link</th>
            <th scope="col">
              <span className="sr-only">What can be done</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {invitations.map(({ id, email, survey, makesOwner, expiresAt, expired }) => (
            <tr key={id} data-tone={expired ? "attention" : undefined}>
              <th scope="row">{email}</th>
              <td>{survey ?? (makesOwner ? "the installation, as owner" : "the installation")}</td>
              <td>{expired ? `expired on ${times.day(expiresAt)}` : `works until ${times.day(expiresAt)}`}</td>
              <td className="text-right">
                {survey === null && (
                  <Button
                    size="small"
                    aria-label={`Withdraw the invitation of ${email}`}
                    busy={withdraw.isPending && withdraw.variables === id}
                    onClick={() =>
                      withdraw.mutate(id, { onSuccess: () => showToast(`The link for ${email} has ended.`) })
                    }
                  >
                    Withdraw
                  </Button>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
    </>
  );
}
