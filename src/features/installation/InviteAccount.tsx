import { useState, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import { Button } from "../../components/ui/Button.tsx";
import { Checkbox } from "../../components/ui/Checkbox.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { useInviteAccount } from "./queries.ts";

const START = { email: "", makesOwner: false };

const isAddress = (text: string) => /^\S+@\S+\.\S+$/.test(text.trim());

/** Invites somebody to the installation, without a survey yet. Into a survey its planner invites. */
export function InviteAccount({ mailsAreKept }: { readonly mailsAreKept: boolean }) {
  const [typed, setTyped] = useState(START);
  const [tried, setTried] = useState(false);
  const invite = useInviteAccount();
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    if (invite.isPending) return;
    flushSync(() => setTried(true));
    if (!isAddress(typed.email)) {
      focusFirstInvalid(event.currentTarget);
      return;
    }
    invite.mutate(typed, {
      onSuccess: () => {
        showToast(
          mailsAreKept
            ? `The invitation of ${typed.email.trim()} is written. It lies below, under Mails, to be forwarded.`
            : `The invitation goes to ${typed.email.trim()}.`,
        );
        // Unless somebody went on typing meanwhile.
        setTyped((now) => (now === typed ? START : now));
        setTried(false);
      },
    });
  };
  return (
    <form className="mt-6 grid max-w-140 gap-4" onSubmit={submit} noValidate>
      <Field
        label="Invite by e-mail"
        help="To start surveys of their own. Into a survey its planner invites, on the page of its people."
        error={tried && !isAddress(typed.email) ? "Write the e-mail address of the person." : undefined}
      >
        <TextInput
          name="email"
          type="email"
          autoComplete="off"
          autoCapitalize="none"
          value={typed.email}
          onChange={(event) => setTyped({ ...typed, email: event.target.value })}
        />
      </Field>
      <Checkbox
        label="As an owner of the installation"
        checked={typed.makesOwner}
        onChange={(event) => setTyped({ ...typed, makesOwner: event.target.checked })}
      />
      {invite.isError && <Refusal error={invite.error} />}
      <div>
        <Button type="submit" busy={invite.isPending} busyLabel="Inviting…">
          Invite to the installation
        </Button>
      </div>
    </form>
  );
}
