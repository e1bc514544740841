import { useState, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import { Problem } from "#shared/problem.ts";
import { Button } from "../../components/ui/Button.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { useChangePassword } from "./account-queries.ts";
import { lackOf, NEW_PASSWORD_HELP, passwordRefusal } from "./new-password.ts";
import { PasswordField } from "./PasswordField.tsx";

function presentRefusal(error: Error | null): string | null {
  return error instanceof Problem && error.code === "password-wrong" ? `${error.title}. ${error.message}` : null;
}

/** The present password and a new one; what was typed stays when it is refused. */
export function PasswordForm({ email }: { readonly email: string }) {
  const [current, setCurrent] = useState("");
  const [next, setNext] = useState("");
  const [tried, setTried] = useState(false);
  const change = useChangePassword();
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    flushSync(() => setTried(true));
    if (current === "" || lackOf(next) !== null) {
      focusFirstInvalid(event.currentTarget);
      return;
    }
    if (change.isPending) return;
    change.mutate(
      { current, next },
      {
        onSuccess: () => {
          showToast("The password is changed; all other sessions have ended.");
          setCurrent("");
          setNext("");
          setTried(false);
        },
      },
    );
  };
  const wrong = presentRefusal(change.error);
  const refused = passwordRefusal(change.error);
  const lack = tried ? lackOf(next) : null;
  return (
    <form className="grid max-w-105 gap-4" onSubmit={submit} noValidate>
      <input hidden readOnly name="username" autoComplete="username" value={email} />
      <PasswordField
        label="Present password"
        kind="current"
        value={current}
        onChange={setCurrent}
        error={tried && current === "" ? "Write the password that you use now." : wrong}
      />
      <PasswordField
        label="New password"
        kind="new"
        value={next}
        onChange={setNext}
        help={NEW_PASSWORD_HELP}
        error={lack ?? refused}
      />
      {change.isError && wrong === null && refused === null && <Refusal error={change.error} />}
      <div>
        <Button type="submit" busy={change.isPending} busyLabel="Changing…">
          Change the password
        </Button>
        <p className="q-help">Everywhere else you are signed out by it.</p>
      </div>
    </form>
  );
}
