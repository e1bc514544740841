import { useState, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { useSetPasswordByLink } from "./link-queries.ts";
import { lackOf, NEW_PASSWORD_HELP, passwordRefusal } from "./new-password.ts";
import { PasswordField } from "./PasswordField.tsx";

interface NewPasswordFormProps {
  readonly secret: string;
  readonly email: string;
  readonly onSet: () => void;
}

/** A new password by a link from a mail. */
export function NewPasswordForm({ secret, email, onSet }: NewPasswordFormProps) {
  const [password, setPassword] = useState("");
  const [tried, setTried] = useState(false);
  const set = useSetPasswordByLink(secret);
  const refused = passwordRefusal(set.error);
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    flushSync(() => setTried(true));
    if (lackOf(password) !== null) focusFirstInvalid(event.currentTarget);
    else if (!set.isPending) set.mutate(password, { onSuccess: onSet });
  };
  return (
    <form className="q-sign-in-form" onSubmit={submit} noValidate>
      {set.isError && refused === null && <Refusal error={set.error} />}
      <Field label="E-mail">
        <TextInput name="email" type="email" autoComplete="username" readOnly value={email} />
      </Field>
      <PasswordField
        label="New password"
        kind="new"
        value={password}
        onChange={setPassword}
        help={NEW_PASSWORD_HELP}
        error={(tried ? lackOf(password) : null) ?? refused}
      />
      <Button type="submit" variant="primary" size="wide" busy={set.isPending} busyLabel="Setting…">
        Set the password and sign in
      </Button>
    </form>
  );
}
