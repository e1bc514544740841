import type { Visit } from "#shared/api/field.ts";
import { isSettled, isVisited, peopleWithCells, waitsForLead } from "../../api/visit-words.ts";
import { Select } from "../../components/ui/Select.tsx";

export interface VisitFilter {
  /** A member's id, "nobody", or everybody where empty. */
  readonly who: string;
  readonly state: "" | "open" | "settled" | "reported";
}

export function shownVisits(visits: readonly Visit[], { who, state }: VisitFilter): Visit[] {
  return visits.filter(
    (visit) =>
      (who === "" || (who === "nobody" ? visit.assignedTo === null : visit.assignedTo?.memberId === who)) &&
      (state === "" ||
        (state === "open" && !isVisited(visit)) ||
        (state === "settled" && isSettled(visit)) ||
        (state === "reported" && waitsForLead(visit))),
  );
}

interface VisitFiltersProps {
  readonly visits: readonly Visit[];
  readonly filter: VisitFilter;
  readonly onFilter: (filter: VisitFilter) => void;
}

export function VisitFilters({ visits, filter, onFilter }: VisitFiltersProps) {
  return (
    <span className="grid min-w-80 grid-cols-2 gap-2">
      <Select
        aria-label="Whose cells"
        value={filter.who}
        onChange={(event) => onFilter({ ...filter, who: event.target.value })}
        options={[
          { value: "", label: "everybody’s" },
          { value: "nobody", label: "nobody’s yet" },
          ...peopleWithCells(visits).map(({ id, name }) => ({ value: id, label: name })),
        ]}
      />
      <Select
        aria-label="In which state"
        value={filter.state}
        onChange={(event) => onFilter({ ...filter, state: event.target.value as VisitFilter["state"] })}
        options={[
          { value: "", label: "in any state" },
          { value: "open", label: "not visited yet" },
          { value: "settled", label: "settled" },
          { value: "reported", label: "reported, not closed" },
        ]}
      />
    </span>
  );
}
