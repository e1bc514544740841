import type { OwnedAccount } from "#shared/api/installation.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Dialog } from "../../components/ui/Dialog.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { useChangeAccount } from "./queries.ts";

export interface AccountAct {
  readonly kind: "owner" | "no-owner" | "close" | "open" | "reset";
  readonly account: OwnedAccount;
}

interface Words {
  readonly title: string;
  readonly lead: string;
  readonly leave: string;
  readonly act: string;
  readonly done: string;
}

function wordsOf({ kind, account: { name, isSelf } }: AccountAct): Words {
  switch (kind) {
    case "owner":
      return {
        title: `Make ${name} an owner?`,
        lead: "An owner sees accounts and mails, sets address and map, and may add people to any survey. It gives no other right inside one.",
        leave: "Leave it",
        act: "Make an owner",
        done: `${name} is an owner now.`,
      };
    case "no-owner":
      return {
        title: isSelf ? "Give up ownership?" : `Take ownership away from ${name}?`,
        lead: "Roles in surveys stay as they are. Somebody else has to be an owner.",
        leave: "Leave it",
        act: isSelf ? "Give it up" : "Take it away",
        done: `${name} is no owner any more.`,
      };
    case "close":
    case "open":
    case "reset":
      return {
        title: isSelf ? "Close your own account?" : `Close the account of ${name}?`,
        lead: "All sessions end at once, and nobody can sign in with it. Records keep the name, roles stay; it can be opened again.",
        leave: "Leave it open",
        act: "Close the account",
        done: `The account of ${name} is closed.`,
      };
  }
}

/** What follows from a change of an account, before it is made. */
export function AccountDialog({ act, onClose }: { readonly act: AccountAct; readonly onClose: () => void }) {
  const change = useChangeAccount();
  const { account, kind } = act;
  const words = wordsOf(act);
  const isOwner = kind === "owner" ? true : kind === "no-owner" ? false : account.isOwner;
  const confirm = () =>
    change.mutate(
      { account, isOwner, closed: kind === "close" },
      {
        onSuccess: () => {
          showToast(words.done);
          onClose();
        },
      },
    );
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={words.title}
      lead={words.lead}
      actions={
        <>
          <Button onClick={onClose}>{words.leave}</Button>
          <Button variant={kind === "owner" ? "primary" : "danger"} busy={change.isPending} onClick={confirm}>
            {words.act}
          </Button>
        </>
      }
    >
      {change.isError && <Refusal error={change.error} />}
    </Dialog>
  );
}
