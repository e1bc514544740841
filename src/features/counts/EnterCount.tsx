import { useState } from "react";
import { flushSync } from "react-dom";
import type { Visit } from "#shared/api/field.ts";
import { Button } from "../../components/ui/Button.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { readCountForm } from "./count-form.ts";
import { CountFields } from "./CountFields.tsx";
import type { CountDraft } from "./drafts.ts";
import { type Said, useEnterCount } from "./queries.ts";
import { saidText } from "./said-text.ts";
import type { CountTarget } from "./target.ts";

interface EnterCountProps {
  readonly surveyId: string;
  readonly visit: Visit;
  readonly target: CountTarget;
  readonly draft: CountDraft;
  readonly onDraft: (draft: CountDraft) => void;
  readonly focused: boolean;
  /** The one filled button of the screen is this form's. */
  readonly primary: boolean;
  /** After it is saved: the next cell. */
  readonly onSaved: () => void;
}

/** The first count of a cell. "Zero" is an act of its own; an entry that did not get through is sent again as the same one. */
export function EnterCount(props: EnterCountProps) {
  const { surveyId, visit, target, draft, onDraft, focused, primary, onSaved } = props;
  const { texts } = draft;
  const [shown, setShown] = useState(false);
  const enter = useEnterCount(surveyId);
  const reading = readCountForm(texts, target);
  const save = (said: Said) => {
    if (enter.isPending) return;
    onDraft(draft);
    const { id } = draft;
    const madeAt = new Date().toISOString();
    enter.mutate(
      { id, visitId: visit.id, targetId: target.id, said, note: texts.note.trim(), madeAt },
      {
        onSuccess: () => {
          showToast(`${visit.label}: ${saidText(said, target.plural)}.`);
          onSaved();
        },
      },
    );
  };
  const empty =
    shown && reading.kind === "empty" ? "Type the number, press Zero, or say why there is none." : undefined;
  return (
    <form
      className="grid gap-3 py-3"
      aria-label={`Count of ${visit.label}`}
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        // At once, so that the field that is wrong can take the focus.
        flushSync(() => setShown(true));
        if (reading.kind === "ready") save(reading.said);
        else focusFirstInvalid(event.currentTarget);
      }}
    >
      {target.countingRule !== "" && <p className="q-help">{`Counted: ${target.countingRule}`}</p>}
      <CountFields
        plural={target.plural}
        texts={texts}
        onTexts={(next) => onDraft({ ...draft, texts: next })}
        error={"why" in reading ? reading.why : empty}
        focused={focused}
      />
      {enter.isError && <Refusal error={enter.error} />}
      <div className="flex flex-wrap gap-3">
        <Button type="submit" variant={primary ? "primary" : "quiet"} busy={enter.isPending} busyLabel="Saving…">
          {reading.kind === "ready" ? `Save: ${saidText(reading.said, target.plural)}` : "Save"}
        </Button>
        {reading.kind === "asked" && (
          <Button onClick={() => save(reading.ifYes)}>{`Yes: ${saidText(reading.ifYes, target.plural)}`}</Button>
        )}
        {texts.number.trim() === "" && texts.reason === null && (
          <Button onClick={() => save({ state: "counted", value: 0 })}>Zero: searched, none found</Button>
        )}
      </div>
    </form>
  );
}
