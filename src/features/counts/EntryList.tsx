import type { CountEntry } from "#shared/api/counts.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { type Said, useEntries } from "./queries.ts";
import { madeText, saidText } from "./said-text.ts";

interface EntryListProps {
  readonly surveyId: string;
  readonly visitId: string;
  readonly plural: string;
}

/** All that was ever written down for one cell, oldest first. */
export function EntryList({ surveyId, visitId, plural }: EntryListProps) {
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
          {`, by ${entry.observer}, ${madeText(times, entry.madeAt)}`}
          {entry.enteredBy !== entry.observer && `, written down by ${entry.enteredBy}`}
          {entry.reason !== "" && `. ${entry.replaces === null ? "Reason" : "Amended"}: “${entry.reason}”`}
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
