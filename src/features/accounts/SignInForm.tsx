import { useState, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { useSignIn } from "./queries.ts";

/** E-mail and password. What was typed stays when it is refused. */
export function SignInForm() {
  const [email, setEmail] = useState("");
  const [password, setPassword] = useState("");
  const [shown, setShown] = useState(false);
  const [missing, setMissing] = useState({ email: false, password: false });
  const signIn = useSignIn();
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
      <Field label="Password" error={missing.password && "Write the password of your account."}>
        <TextInput
          name="password"
          type={shown ? "text" : "password"}
          autoComplete="current-password"
          value={password}
          onChange={(event) => setPassword(event.target.value)}
          end={
            <button
              type="button"
              className="q-input-act"
              aria-pressed={shown}
              aria-label={shown ? "Hide the password" : "Show the password"}
              onClick={() => setShown(!shown)}
            >
              {shown ? "Hide" : "Show"}
            </button>
          }
        />
      </Field>
      <Button type="submit" variant="primary" size="wide" busy={signIn.isPending} busyLabel="Signing in…">
        Sign in
      </Button>
    </form>
  );
}
