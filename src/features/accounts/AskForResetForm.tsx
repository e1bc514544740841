import { useState, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { useRequestReset } from "./link-queries.ts";

interface AskForResetFormProps {
  /** With the address that was typed; whether it has an account is not told. */
  readonly onAsked: (email: string) => void;
}

/** Asks for a link by which a forgotten password is replaced. */
export function AskForResetForm({ onAsked }: AskForResetFormProps) {
  const [email, setEmail] = useState("");
  const [lacks, setLacks] = useState(false);
  const ask = useRequestReset();
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    const address = email.trim();
    const isNone = !/^\S+@\S+\.\S+$/.test(address);
    flushSync(() => setLacks(isNone));
    if (isNone) focusFirstInvalid(event.currentTarget);
    else if (!ask.isPending) ask.mutate(address, { onSuccess: () => onAsked(address) });
  };
  return (
    <form className="q-sign-in-form" onSubmit={submit} noValidate>
      {ask.isError && <Refusal error={ask.error} />}
      <Field label="E-mail" error={lacks && "Write the e-mail address of your account."}>
        <TextInput
          name="email"
          type="email"
          autoComplete="username"
          autoCapitalize="none"
          value={email}
          onChange={(event) => setEmail(event.target.value)}
        />
      </Field>
      <Button type="submit" variant="primary" size="wide" busy={ask.isPending} busyLabel="Asking…">
        Send me a link
      </Button>
    </form>
  );
}
