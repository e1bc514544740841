import { useState } from "react";
import type { Visit } from "#shared/api/field.ts";
import { Button } from "../../components/ui/Button.tsx";
import { formatNumber } from "../../components/ui/format.ts";
import { Section } from "../../components/ui/Section.tsx";
import { AssignBar } from "./AssignBar.tsx";
import { shownVisits, type VisitFilter, VisitFilters } from "./VisitFilters.tsx";
import { VisitTable } from "./VisitTable.tsx";

const EVERY_CELL: VisitFilter = { who: "", state: "" };

interface CellsToVisitProps {
  readonly surveyId: string;
  readonly visits: readonly Visit[];
  readonly mayAssign: boolean;
  readonly chosen: string | null;
  readonly onChoose: (visitId: string | null) => void;
  /** Asks to close the chosen cell; absent where that may not be done. */
  readonly onClosing: ((visitId: string) => void) | undefined;
}

/** The list: filtered, and shared out by selection. A cell that is selected stays so when the filter hides it, and that is said. */
export function CellsToVisit({ surveyId, visits, mayAssign, chosen, onChoose, onClosing }: CellsToVisitProps) {
  const [filter, setFilter] = useState(EVERY_CELL);
  const [ticked, setTicked] = useState<ReadonlySet<string>>(new Set());
  const shown = shownVisits(visits, filter);
  const selected = new Set(visits.map(({ id }) => id).filter((id) => ticked.has(id)));
  const open = shown.filter(({ state }) => state === "in-use");
  const hiddenChoice = shown.some(({ id }) => id === chosen) ? undefined : visits.find(({ id }) => id === chosen);
  const select = (visitId: string, on: boolean) => {
    setTicked((before) => {
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
            selected={visits.filter(({ id }) => selected.has(id))}
            hidden={selected.size - shown.filter(({ id }) => selected.has(id)).length}
            onDone={() => setTicked(new Set())}
            onUnselect={(ids) => setTicked((before) => new Set([...before].filter((id) => !ids.includes(id))))}
          />
          <p className="my-2 flex flex-wrap gap-4">
            <Button variant="link" size="small" onClick={() => setTicked(new Set(open.map(({ id }) => id)))}>
              {`Select all ${formatNumber(open.length)} shown`}
            </Button>
            {selected.size > 0 && (
              <Button variant="link" size="small" onClick={() => setTicked(new Set())}>
                Select none
              </Button>
            )}
          </p>
        </>
      )}
      {hiddenChoice !== undefined && (
        <p className="my-2">
          {`${hiddenChoice.label} is hidden by the filter. `}
          <Button variant="link" size="small" onClick={() => setFilter(EVERY_CELL)}>
            Show every cell
          </Button>
        </p>
      )}
      <VisitTable
        visits={shown}
        selected={mayAssign ? selected : null}
        onSelect={select}
        chosen={chosen}
        onChoose={(id) => onChoose(chosen === id ? null : id)}
        onClosing={onClosing}
      />
    </Section>
  );
}
