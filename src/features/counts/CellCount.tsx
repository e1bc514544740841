import { useState } from "react";
import type { CountEntry } from "#shared/api/counts.ts";
import type { Visit } from "#shared/api/field.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { AmendCount } from "./AmendCount.tsx";
import { EnterCount } from "./EnterCount.tsx";
import { saidText } from "./said-text.ts";
import { type Said, useEntries } from "./queries.ts";
import type { CountTarget } from "./target.ts";

interface CellCountProps {
  readonly surveyId: string;
  readonly visit: Visit;
  readonly target: CountTarget;
  readonly mayEnter: boolean;
  readonly mayAmend: boolean;
  readonly onSaved: () => void;
}

/** What opens below a cell: the entry form, or what was written down with its history and the way to amend it. */
export function CellCount({ surveyId, visit, target, mayEnter, mayAmend, onSaved }: CellCountProps) {
  const times = useTimes();
  const [amending, setAmending] = useState(false);
  const { count } = visit;
  if (count.state === "not-visited") {
    if (!mayEnter || visit.state === "closed") return <p className="py-3">Nobody has written anything down yet.</p>;
    return <EnterCount surveyId={surveyId} visit={visit} target={target} onSaved={onSaved} />;
  }
  if (amending) {
    return (
      <AmendCount
        surveyId={surveyId}
        visit={visit}
        replaces={count.entryId}
        target={target}
        onDone={() => setAmending(false)}
      />
    );
  }
  return (
    <div className="grid gap-3 py-3">
      <p>
        {`${saidText(count.state === "counted" ? { state: "counted", value: count.value } : { state: count.state }, target.plural)}, by ${count.by}, ${times.time(count.at)}${count.amended ? ", amended" : ""}.`}
        {count.note !== "" && ` “${count.note}”`}
      </p>
      {mayAmend && (
        <div>
          <Button onClick={() => setAmending(true)}>Amend…</Button>
        </div>
      )}
      {mayEnter && (
        <Fold quiet title="All that was written down">
          <Entries surveyId={surveyId} visitId={visit.id} plural={target.plural} />
        </Fold>
      )}
    </div>
  );
}

function Entries({
  surveyId,
  visitId,
  plural,
}: {
  readonly surveyId: string;
  readonly visitId: string;
  readonly plural: string;
}) {
  const times = useTimes();
  const entries = useEntries(surveyId, visitId);
  if (entries.data === undefined) {
    return entries.error === null ? <RuledLoading label="Loading the entries" /> : <Refusal error={entries.error} />;
  }
  return (
    <ol className="grid gap-2 py-2">
      {entries.data.map((entry) => (
        <li key={entry.id}>
          <b>{saidText(saidIn(entry), plural)}</b>
          {`, by ${entry.observer}, ${times.time(entry.madeAt)}`}
          {entry.reason !== "" && `. Amended: “${entry.reason}”`}
          {entry.note !== "" && `. “${entry.note}”`}
        </li>
      ))}
    </ol>
  );
}

function saidIn({ state, value }: CountEntry): Said {
  if (state !== "counted") return { state };
  if (value === null) throw new RangeError("a counted entry without its number");
  return { state, value };
}
