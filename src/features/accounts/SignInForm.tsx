import { useState, type ReactNode, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { PasswordField } from "./PasswordField.tsx";
import type { SignIn } from "./queries.ts";

interface SignInFormProps {
  readonly signIn: SignIn;
  /** The address that is there already. */
  readonly email?: string;
  /** Between the password and the button: the way out for those who forgot it. */
  readonly children?: ReactNode;
}

/** E-mail and password. What was typed stays when it is refused. */
export function SignInForm({ signIn, email: known = "", children }: SignInFormProps) {
  const [email, setEmail] = useState(known);
  const [password, setPassword] = useState("");
  const [missing, setMissing] = useState({ email: false, password: false });
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    const lacks = { email: email.trim() === "", password: password === "" };
    flushSync(() => setMissing(lacks));
    if (lacks.email || lacks.password) focusFirstInvalid(event.currentTarget);
    else if (!signIn.isPending) signIn.mutate({ email, password });
  };
  return (
    <form className="q-sign-in-form" onSubmit={submit} noValidate>
      {signIn.isError && <Refusal error={signIn.error} />}
      <Field label="E-mail" error={missing.email && "Write the address of your account."}>
        <TextInput
          name="email"
          type="email"
          autoComplete="username"
          autoCapitalize="none"
          value={email}
          onChange={(event) => setEmail(event.target.value)}
        />
      </Field>
      <PasswordField
        label="Password"
        kind="current"
        value={password}
        onChange={setPassword}
        error={missing.password && "Write the password of your account."}
      />
      {children}
      <Button type="submit" variant="primary" size="wide" busy={signIn.isPending} busyLabel="Signing in…">
        Sign in
      </Button>
    </form>
  );
}
