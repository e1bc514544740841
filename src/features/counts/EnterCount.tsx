import { useState } from "react";
import type { Visit } from "#shared/api/field.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { type CountTexts, EMPTY_TEXTS, readCountForm } from "./count-form.ts";
import { CountFields } from "./CountFields.tsx";
import { type Said, useEnterCount } from "./queries.ts";
import { saidText } from "./said-text.ts";
import type { CountTarget } from "./target.ts";

interface EnterCountProps {
  readonly surveyId: string;
  readonly visit: Visit;
  readonly target: CountTarget;
  /** After it is saved: the next cell. */
  readonly onSaved: () => void;
}

/** The first count of a cell. "Zero" is an act of its own; an entry that did not get through is sent again as the same one. */
export function EnterCount({ surveyId, visit, target, onSaved }: EnterCountProps) {
  const [id] = useState(() => crypto.randomUUID());
  const [texts, setTexts] = useState<CountTexts>(EMPTY_TEXTS);
  const [shown, setShown] = useState(false);
  const enter = useEnterCount(surveyId);
  const reading = readCountForm(texts, target.wholeNumbers);
  const save = (said: Said) => {
    enter.mutate(
      { id, visitId: visit.id, targetId: target.id, said, note: texts.note.trim(), madeAt: new Date().toISOString() },
      {
        onSuccess: () => {
          showToast(`${visit.label}: ${saidText(said, target.plural)}.`);
          onSaved();
        },
      },
    );
  };
  const error =
    reading.kind === "wrong"
      ? reading.why
      : shown && reading.kind === "empty"
        ? "Type the number, press Zero, or say why there is none."
        : undefined;
  return (
    <form
      className="grid gap-3 py-3"
      aria-label={`Count of ${visit.label}`}
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        setShown(true);
        if (reading.kind === "ready") save(reading.said);
      }}
    >
      {target.countingRule !== "" && <p className="q-help">{`Counted: ${target.countingRule}`}</p>}
      <CountFields plural={target.plural} texts={texts} onTexts={setTexts} error={error} />
      {enter.isError && <Refusal error={enter.error} />}
      <div className="flex flex-wrap gap-3">
        <Button type="submit" variant="primary" busy={enter.isPending} busyLabel="Saving…">
          {reading.kind === "ready" ? `Save: ${saidText(reading.said, target.plural)}` : "Save"}
        </Button>
        {texts.number.trim() === "" && texts.reason === null && (
          <Button onClick={() => save({ state: "counted", value: 0 })}>Zero: searched, none found</Button>
        )}
      </div>
    </form>
  );
}
