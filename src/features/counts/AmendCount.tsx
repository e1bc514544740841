import { useState } from "react";
import { flushSync } from "react-dom";
import type { Visit } from "#shared/api/field.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { TextArea } from "../../components/ui/TextArea.tsx";
import { readCountForm } from "./count-form.ts";
import { CountFields } from "./CountFields.tsx";
import type { CountDraft } from "./drafts.ts";
import { type Said, useAmendCount } from "./queries.ts";
import { saidText } from "./said-text.ts";
import type { CountTarget } from "./target.ts";

interface AmendCountProps {
  readonly surveyId: string;
  readonly visit: Visit;
  /** The entry in force. */
  readonly replaces: string;
  readonly target: CountTarget;
  readonly draft: CountDraft;
  readonly onDraft: (draft: CountDraft) => void;
  readonly primary: boolean;
  readonly onAmended: () => void;
  /** Folds the form away; what is typed stays. */
  readonly onLeave: () => void;
}

/** A new entry in place of the one in force, which stays readable. A reason is needed. */
export function AmendCount(props: AmendCountProps) {
  const { surveyId, visit, replaces, target, draft, onDraft, primary, onAmended, onLeave } = props;
  const { texts, reason } = draft;
  const [shown, setShown] = useState(false);
  const amend = useAmendCount(surveyId);
  const reading = readCountForm(texts, target);
  const reasonMissing = reason.trim().length < 3;
  const save = (said: Said) => {
    if (amend.isPending) return;
    onDraft(draft);
    const madeAt = new Date().toISOString();
    const written = { said, note: texts.note.trim(), reason: reason.trim(), madeAt };
    amend.mutate(
      { id: draft.id, visitId: visit.id, targetId: target.id, replaces, ...written },
      {
        onSuccess: () => {
          showToast(`${visit.label} is amended. The old entry stays on record.`);
          onAmended();
        },
      },
    );
  };
  const empty = shown && reading.kind === "empty" ? "Say what it should be." : undefined;
  return (
    <form
      className="grid gap-3 py-3"
      aria-label={`Amendment of ${visit.label}`}
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        // At once, so that the field that is wrong can take the focus.
        flushSync(() => setShown(true));
        if (reading.kind === "ready" && !reasonMissing) save(reading.said);
        else focusFirstInvalid(event.currentTarget);
      }}
    >
      <CountFields
        plural={target.plural}
        texts={texts}
        onTexts={(next) => onDraft({ ...draft, texts: next })}
        error={"why" in reading ? reading.why : empty}
        focused
      />
      <Field label="Why it is amended" error={shown && reasonMissing ? "Say why: it stands in the record." : undefined}>
        <TextArea value={reason} onChange={(event) => onDraft({ ...draft, reason: event.target.value })} />
      </Field>
      {amend.isError && <Refusal error={amend.error} />}
      <div className="flex flex-wrap gap-3">
        <Button type="submit" variant={primary ? "primary" : "quiet"} busy={amend.isPending} busyLabel="Amending…">
          {reading.kind === "ready" ? `Amend to ${saidText(reading.said, target.plural)}` : "Amend"}
        </Button>
        <Button onClick={onLeave}>Leave it</Button>
      </div>
    </form>
  );
}
