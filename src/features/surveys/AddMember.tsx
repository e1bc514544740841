import { useRef, useState, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import type { Role } from "#shared/access/table.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Checkbox } from "../../components/ui/Checkbox.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { RadioCards } from "../../components/ui/RadioCards.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { problemOf } from "../../api/problem-of.ts";
import { useAddMember } from "./queries.ts";

const ROLE_CARDS: readonly { value: Role; title: string; text: string }[] = [
  { value: "planner", title: "Planner", text: "Area, frame, draw, people; reads and amends everything." },
  { value: "lead", title: "Lead", text: "Shares cells out, waypoints, counts and amendments; reads the estimate." },
  { value: "counter", title: "Counter", text: "Sees and counts the cells that are given to them." },
  { value: "auditor", title: "Auditor", text: "Reads everything, replays the record, changes nothing." },
];

const START = { email: "", role: "counter" as Role, isNew: false, name: "", password: "" };
type Typed = typeof START;

/** What a field lacks, by its name. */
type Lacks = Partial<Record<"email" | "name" | "password", string>>;

function lacksOf(typed: Typed): Lacks {
  return {
    ...(!/^\S+@\S+\.\S+$/.test(typed.email.trim()) && { email: "Write the e-mail address of the person." }),
    ...(typed.isNew && typed.name.trim() === "" && { name: "Write the name that others will see." }),
    ...(typed.isNew &&
      typed.password.length < 12 && {
        password: "Use twelve characters or more; a short sentence is easy to remember.",
      }),
  };
}

interface NewAccountFieldsProps {
  readonly typed: Typed;
  readonly lacks: Lacks;
  readonly onChange: (part: Partial<Typed>) => void;
}

function NewAccountFields({ typed, lacks, onChange }: NewAccountFieldsProps) {
  return (
    <div className="grid gap-5 md:grid-cols-2">
      <Field label="Name" error={lacks.name}>
        <TextInput
          name="name"
          autoComplete="off"
          value={typed.name}
          onChange={(event) => onChange({ name: event.target.value })}
        />
      </Field>
      <Field label="First password" help="At least twelve characters." error={lacks.password}>
        <TextInput
          name="password"
          autoComplete="off"
          autoCapitalize="none"
          mono
          value={typed.password}
          onChange={(event) => onChange({ password: event.target.value })}
        />
      </Field>
    </div>
  );
}

/** Gives somebody a role; makes an account with a first password where they have none. */
export function AddMember({ surveyId }: { readonly surveyId: string }) {
  const [typed, setTyped] = useState(START);
  const [tried, setTried] = useState(false);
  const form = useRef<HTMLFormElement>(null);
  const add = useAddMember(surveyId);
  const lacks = tried ? lacksOf(typed) : {};
  const change = (part: Partial<Typed>) => setTyped((before) => ({ ...before, ...part }));
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    if (add.isPending) return;
    flushSync(() => setTried(true));
    if (Object.keys(lacksOf(typed)).length > 0) {
      focusFirstInvalid(event.currentTarget);
      return;
    }
    const { email, role, isNew, name, password } = typed;
    const body = { email, role, ...(isNew && { newAccount: { name, password } }) };
    add.mutate(body, {
      onSuccess: () => {
        showToast(`${isNew ? name : email} is ${role} of this survey now.`);
        // Unless somebody went on typing meanwhile.
        setTyped((now) => (now === typed ? { ...START, role } : now));
        setTried(false);
      },
    });
  };
  const makeAccount = () => {
    flushSync(() => {
      change({ isNew: true });
      add.reset();
    });
    form.current?.querySelector<HTMLInputElement>('[name="name"]')?.focus();
  };
  const hasNoAccount = add.isError && problemOf(add.error).code === "account-not-found" && !typed.isNew;
  return (
    <form ref={form} className="grid max-w-140 gap-5" onSubmit={submit} noValidate>
      <Field label="E-mail" error={lacks.email}>
        <TextInput
          name="email"
          type="email"
          autoComplete="off"
          autoCapitalize="none"
          value={typed.email}
          onChange={(event) => change({ email: event.target.value })}
        />
      </Field>
      <RadioCards legend="Role" value={typed.role} onChange={(role) => change({ role })} options={ROLE_CARDS} />
      <Checkbox
        label="They have no account here yet"
        help="You make one with a first password and tell it to them yourself."
        checked={typed.isNew}
        onChange={(event) => change({ isNew: event.target.checked })}
      />
      {typed.isNew && <NewAccountFields typed={typed} lacks={lacks} onChange={change} />}
      {add.isError && (
        <Refusal
          error={add.error}
          next={hasNoAccount ? <Button onClick={makeAccount}>Make an account for them</Button> : undefined}
        />
      )}
      <div>
        <Button type="submit" variant="primary" busy={add.isPending} busyLabel="Adding…">
          Add to the survey
        </Button>
        <p className="q-help">Who was added by whom, and as what, is an event in the record.</p>
      </div>
    </form>
  );
}
