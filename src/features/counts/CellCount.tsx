import { useState } from "react";
import type { Visit } from "#shared/api/field.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import type { Times } from "../../components/ui/format.ts";
import { useTimes } from "../../components/ui/use-times.ts";
import { AmendCount } from "./AmendCount.tsx";
import type { Drafts } from "./drafts.ts";
import { EnterCount } from "./EnterCount.tsx";
import { EntryList } from "./EntryList.tsx";
import { madeText, saidText } from "./said-text.ts";
import type { CountTarget } from "./target.ts";

interface CellCountProps {
  readonly surveyId: string;
  readonly visit: Visit;
  readonly target: CountTarget;
  readonly drafts: Drafts;
  readonly mayEnter: boolean;
  readonly mayAmend: boolean;
  readonly focused: boolean;
  readonly primary: boolean;
  readonly onSaved: () => void;
}

/**
 * What opens below a cell: the entry form, or what was written down with its history and the way to amend it. Where somebody
 * else gives the cell a count meanwhile, the form with what is typed stays until it is left.
 */
export function CellCount(props: CellCountProps) {
  const { surveyId, visit, target, drafts, mayEnter, mayAmend, focused, primary, onSaved } = props;
  const times = useTimes();
  const { count } = visit;
  const [form, setForm] = useState<"enter" | "amend" | null>(count.state === "not-visited" ? "enter" : null);
  const draft = drafts.of(visit.id);
  const shared = {
    surveyId,
    visit,
    target,
    draft,
    primary,
    onDraft: (next: typeof draft) => drafts.put(visit.id, next),
  };
  if (form === "enter" && mayEnter && visit.state !== "closed") {
    return (
      <>
        {count.state !== "not-visited" && (
          <Banner
            tone="ochre"
            title={`${visit.label} was given a count meanwhile: ${inForce(visit, target.plural, times)}`}
            next={
              <Button
                size="small"
                onClick={() => {
                  // What was typed goes on into an amendment, as an entry of its own.
                  drafts.put(visit.id, { ...draft, id: crypto.randomUUID() });
                  setForm(mayAmend ? "amend" : null);
                }}
              >
                {mayAmend ? "Amend it…" : "Leave it"}
              </Button>
            }
          >
            What you typed stands below and is not saved.
          </Banner>
        )}
        <EnterCount
          {...shared}
          focused={focused}
          onSaved={() => {
            drafts.drop(visit.id);
            onSaved();
          }}
        />
      </>
    );
  }
  if (count.state === "not-visited") return <p className="py-3">Nobody has written anything down yet.</p>;
  return (
    <div className="grid gap-3 py-3">
      <p>
        {inForce(visit, target.plural, times)}
        {count.note !== "" && ` “${count.note}”`}
      </p>
      {form === "amend" ? (
        <AmendCount
          {...shared}
          replaces={count.entryId}
          onAmended={() => {
            drafts.drop(visit.id);
            setForm(null);
          }}
          onLeave={() => setForm(null)}
        />
      ) : (
        mayAmend && (
          <div>
            <Button onClick={() => setForm("amend")}>Amend…</Button>
          </div>
        )
      )}
      {mayEnter && (
        <Fold quiet title="All that was written down">
          <EntryList surveyId={surveyId} visitId={visit.id} plural={target.plural} />
        </Fold>
      )}
    </div>
  );
}

/** "7 burrows, by A. Reeve, 3 June 2031, amended." */
function inForce({ count }: Visit, plural: string, times: Times): string {
  if (count.state === "not-visited") return "nothing yet.";
  const said = count.state === "counted" ? { state: count.state, value: count.value } : { state: count.state };
  return `${saidText(said, plural)}, by ${count.by}, ${madeText(times, count.at)}${count.amended ? ", amended" : ""}.`;
}
