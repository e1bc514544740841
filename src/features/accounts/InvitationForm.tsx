import { useState, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import type { InvitationSeen } from "#shared/api/people.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { useAcceptInvitation } from "./link-queries.ts";
import { lackOf, NEW_PASSWORD_HELP, passwordRefusal } from "./new-password.ts";
import { PasswordField } from "./PasswordField.tsx";

interface InvitationFormProps {
  readonly secret: string;
  readonly invitation: InvitationSeen;
  /** This address is signed in here already. */
  readonly isSignedIn: boolean;
  /** With the survey that it led to. */
  readonly onAccepted: (surveyId: string | null) => void;
}

interface Lacks {
  readonly name: string | null;
  readonly password: string | null;
}

function lacksOf(hasAccount: boolean, name: string, password: string): Lacks {
  if (!hasAccount) {
    return { name: name.trim() === "" ? "Write the name that the others will see." : null, password: lackOf(password) };
  }
  return { name: null, password: password === "" ? "Write the password of your account." : null };
}

function passwordHelp(hasAccount: boolean, isSignedIn: boolean): string {
  if (!hasAccount) return NEW_PASSWORD_HELP;
  return isSignedIn
    ? "Of the account that is signed in here, so that nobody else at this browser accepts for you."
    : "This address has an account here: its password.";
}

function actOf({ survey, role }: InvitationSeen): string {
  return survey === null || role === null ? "Accept the invitation" : `Take part as ${role}`;
}

/** A name and a password for a new account, or the password of the one that the address has. */
export function InvitationForm({ secret, invitation, isSignedIn, onAccepted }: InvitationFormProps) {
  const { hasAccount } = invitation;
  const [name, setName] = useState("");
  const [password, setPassword] = useState("");
  const [tried, setTried] = useState(false);
  const accept = useAcceptInvitation(secret);
  const lacks = tried ? lacksOf(hasAccount, name, password) : { name: null, password: null };
  const refused = passwordRefusal(accept.error);
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    if (accept.isPending) return;
    flushSync(() => setTried(true));
    const now = lacksOf(hasAccount, name, password);
    if (now.name !== null || now.password !== null) {
      focusFirstInvalid(event.currentTarget);
      return;
    }
    accept.mutate(hasAccount ? { password } : { name: name.trim(), password }, {
      onSuccess: ({ surveyId }) => onAccepted(surveyId),
    });
  };
  return (
    <form className="q-sign-in-form" onSubmit={submit} noValidate>
      {accept.isError && refused === null && <Refusal error={accept.error} />}
      <Field label="E-mail">
        <TextInput name="email" type="email" autoComplete="username" readOnly value={invitation.email} />
      </Field>
      {!hasAccount && (
        <Field label="Your name" help="As the others of the survey and its record will see it." error={lacks.name}>
          <TextInput name="name" autoComplete="name" value={name} onChange={(event) => setName(event.target.value)} />
        </Field>
      )}
      <PasswordField
        label="Password"
        kind={hasAccount ? "current" : "new"}
        value={password}
        onChange={setPassword}
        help={passwordHelp(hasAccount, isSignedIn)}
        error={lacks.password ?? refused}
      />
      <Button type="submit" variant="primary" size="wide" busy={accept.isPending} busyLabel="Letting you in…">
        {actOf(invitation)}
      </Button>
    </form>
  );
}
