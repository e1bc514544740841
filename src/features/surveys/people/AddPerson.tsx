import { useState, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import { ROLES, type Role } from "#shared/access/table.ts";
import type { People } from "#shared/api/people.ts";
import { ROLE_DOES, ROLE_NAMES } from "../../../api/role-words.ts";
import { Button } from "../../../components/ui/Button.tsx";
import { Field } from "../../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../../components/ui/focus-first-invalid.ts";
import { RadioCards } from "../../../components/ui/RadioCards.tsx";
import { Refusal } from "../../../components/ui/Refusal.tsx";
import { showToast } from "../../../components/ui/show-toast.tsx";
import { TextInput } from "../../../components/ui/TextInput.tsx";
import { useAddPerson } from "./queries.ts";

const ROLE_CARDS = ROLES.map((value) => ({ value, title: ROLE_NAMES[value], text: ROLE_DOES[value] }));

interface Typed {
  readonly email: string;
  readonly role: Role;
}
const START: Typed = { email: "", role: "counter" };

/** Whether it was done at once or by an invitation, and how that one's mail stands. */
function doneWords({ email, role }: Typed, { invitations }: People): string {
  const address = email.trim().toLowerCase();
  const invited = invitations.find((one) => one.email === address && one.role === role);
  if (invited === undefined) return `${address} is ${role} of this survey now.`;
  return invited.mail === "kept"
    ? `${address} is invited as ${role}. No mail server is set up: the owner finds the mail under Mails.`
    : `${address} is invited as ${role}; the mail is on its way.`;
}

/** Gives somebody a role by their address: at once, or by an invitation. */
export function AddPerson({ surveyId }: { readonly surveyId: string }) {
  const [typed, setTyped] = useState(START);
  const [tried, setTried] = useState(false);
  const add = useAddPerson(surveyId);
  const isNone = !/^\S+@\S+\.\S+$/.test(typed.email.trim());
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    if (add.isPending) return;
    flushSync(() => setTried(true));
    if (isNone) {
      focusFirstInvalid(event.currentTarget);
      return;
    }
    add.mutate(typed, {
      onSuccess: (people) => {
        showToast(doneWords(typed, people));
        // Unless somebody went on typing meanwhile.
        setTyped((now) => (now === typed ? { ...START, role: typed.role } : now));
        setTried(false);
      },
    });
  };
  return (
    <form className="grid max-w-140 gap-5" onSubmit={submit} noValidate>
      <Field
        label="E-mail"
        help="Who has an account here holds the role at once and is told by mail. Anybody else is invited: a mail with a link, good for 14 days."
        error={tried && isNone && "Write the e-mail address of the person."}
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
      <RadioCards
        legend="Role"
        value={typed.role}
        onChange={(role) => setTyped({ ...typed, role })}
        options={ROLE_CARDS}
      />
      {add.isError && <Refusal error={add.error} />}
      <div>
        <Button type="submit" variant="primary" busy={add.isPending} busyLabel="Adding…">
          Add to the survey
        </Button>
        <p className="q-help">
          Who was given which role, when and by whom is an event in the record; the address is not.
        </p>
      </div>
    </form>
  );
}
