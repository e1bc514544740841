import { useState, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { useChangeName } from "./account-queries.ts";

/** One's own name, as others see it. */
export function NameForm({ name }: { readonly name: string }) {
  const [typed, setTyped] = useState(name);
  const [tried, setTried] = useState(false);
  const change = useChangeName();
  const isEmpty = typed.trim() === "";
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    flushSync(() => setTried(true));
    if (isEmpty) focusFirstInvalid(event.currentTarget);
    else if (!change.isPending) {
      change.mutate(typed.trim(), { onSuccess: (account) => showToast(`You are ${account.name} from now on.`) });
    }
  };
  return (
    <form className="grid max-w-105 gap-4" onSubmit={submit} noValidate>
      <Field
        label="Name"
        help="A new name stands in all your surveys; their records tell that it changed."
        error={tried && isEmpty && "Write the name that the others will see."}
      >
        <TextInput name="name" autoComplete="name" value={typed} onChange={(event) => setTyped(event.target.value)} />
      </Field>
      {change.isError && <Refusal error={change.error} />}
      <div>
        <Button type="submit" busy={change.isPending} busyLabel="Changing…">
          Change the name
        </Button>
      </div>
    </form>
  );
}
