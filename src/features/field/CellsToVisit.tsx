import { useState } from "react";
import type { Visit } from "#shared/api/field.ts";
import { Button } from "../../components/ui/Button.tsx";
import { formatNumber } from "../../components/ui/format.ts";
import { Section } from "../../components/ui/Section.tsx";
import { AssignBar } from "./AssignBar.tsx";
import { useFieldMembers } from "./queries.ts";
import { shownVisits, type VisitFilter, VisitFilters } from "./VisitFilters.tsx";
import { VisitTable } from "./VisitTable.tsx";

interface CellsToVisitProps {
  readonly surveyId: string;
  readonly visits: readonly Visit[];
  readonly mayAssign: boolean;
  readonly chosen: string | null;
  readonly onChoose: (visitId: string | null) => void;
  /** Asks to close the chosen cell; absent where that may not be done. */
  readonly onClosing: ((visitId: string) => void) | undefined;
}

/** The list: filtered, shared out by selection, and the way to close the chosen cell. */
export function CellsToVisit({ surveyId, visits, mayAssign, chosen, onChoose, onClosing }: CellsToVisitProps) {
  const [filter, setFilter] = useState<VisitFilter>({ who: "", state: "" });
  const [selected, setSelected] = useState<ReadonlySet<string>>(new Set());
  const members = useFieldMembers(surveyId, mayAssign);
  const shown = shownVisits(visits, filter);
  const chosenVisit = visits.find(({ id }) => id === chosen);
  const select = (visitId: string, on: boolean) => {
    setSelected((before) => {
      const after = new Set(before);
      if (on) after.add(visitId);
      else after.delete(visitId);
      return after;
    });
  };
  return (
    <Section title="Cells to visit" aside={<VisitFilters visits={visits} filter={filter} onFilter={setFilter} />}>
      {mayAssign && (
        <>
          <AssignBar
            surveyId={surveyId}
            members={members.data ?? []}
            selected={selected}
            onDone={() => setSelected(new Set())}
          />
          <p className="my-2 flex flex-wrap gap-4">
            <Button variant="link" size="small" onClick={() => setSelected(new Set(shown.map(({ id }) => id)))}>
              {`Select all ${formatNumber(shown.length)} shown`}
            </Button>
            {selected.size > 0 && (
              <Button variant="link" size="small" onClick={() => setSelected(new Set())}>
                Select none
              </Button>
            )}
          </p>
        </>
      )}
      {onClosing !== undefined && chosenVisit !== undefined && (
        <p className="my-2">
          <Button
            disabled={chosenVisit.state === "closed" || chosenVisit.count.state === "counted"}
            onClick={() => onClosing(chosenVisit.id)}
          >
            {`Close ${chosenVisit.label}…`}
          </Button>
        </p>
      )}
      <VisitTable
        visits={shown}
        selected={mayAssign ? selected : null}
        onSelect={select}
        chosen={chosen}
        onChoose={(id) => onChoose(chosen === id ? null : id)}
      />
    </Section>
  );
}
