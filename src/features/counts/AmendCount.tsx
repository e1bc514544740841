import { useState } from "react";
import type { Visit } from "#shared/api/field.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { TextArea } from "../../components/ui/TextArea.tsx";
import { type CountTexts, EMPTY_TEXTS, readCountForm } from "./count-form.ts";
import { CountFields } from "./CountFields.tsx";
import { saidText } from "./said-text.ts";
import { useAmendCount } from "./queries.ts";
import type { CountTarget } from "./target.ts";

interface AmendCountProps {
  readonly surveyId: string;
  readonly visit: Visit;
  /** The entry in force. */
  readonly replaces: string;
  readonly target: CountTarget;
  readonly onDone: () => void;
}

/** A new entry in place of the one in force, which stays readable. A reason is needed. */
export function AmendCount({ surveyId, visit, replaces, target, onDone }: AmendCountProps) {
  const [id] = useState(() => crypto.randomUUID());
  const [texts, setTexts] = useState<CountTexts>(EMPTY_TEXTS);
  const [reason, setReason] = useState("");
  const [shown, setShown] = useState(false);
  const amend = useAmendCount(surveyId);
  const reading = readCountForm(texts, target.wholeNumbers);
  const reasonMissing = reason.trim().length < 3;
  const error =
    reading.kind === "wrong" ? reading.why : shown && reading.kind === "empty" ? "Say what it should be." : undefined;
  return (
    <form
      className="grid gap-3 py-3"
      aria-label={`Amendment of ${visit.label}`}
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        setShown(true);
        if (reading.kind !== "ready" || reasonMissing) return;
        amend.mutate(
          {
            id,
            visitId: visit.id,
            targetId: target.id,
            replaces,
            said: reading.said,
            note: texts.note.trim(),
            reason: reason.trim(),
            madeAt: new Date().toISOString(),
          },
          {
            onSuccess: () => {
              showToast(`${visit.label} is amended. The old entry stays on record.`);
              onDone();
            },
          },
        );
      }}
    >
      <CountFields plural={target.plural} texts={texts} onTexts={setTexts} error={error} />
      <Field label="Why it is amended" error={shown && reasonMissing ? "Say why: it stands in the record." : undefined}>
        <TextArea value={reason} onChange={(event) => setReason(event.target.value)} />
      </Field>
      {amend.isError && <Refusal error={amend.error} />}
      <div className="flex flex-wrap gap-3">
        <Button type="submit" variant="primary" busy={amend.isPending} busyLabel="Amending…">
          {reading.kind === "ready" ? `Amend to ${saidText(reading.said, target.plural)}` : "Amend"}
        </Button>
        <Button onClick={onDone}>Leave it</Button>
      </div>
    </form>
  );
}
