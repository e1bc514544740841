import type { Visit } from "#shared/api/field.ts";
import { markOf } from "../../api/visit-words.ts";
import type { DataColumn } from "../../components/ui/data-column.ts";
import { DataTable } from "../../components/ui/DataTable.tsx";
import { VisitStateLabel } from "../../components/ui/VisitStateLabel.tsx";
import { VISIT_COLUMNS } from "../../components/visits/visit-columns.tsx";

interface VisitTableProps {
  readonly visits: readonly Visit[];
  /** Selected for sharing out; null where nothing can be shared out. */
  readonly selected: ReadonlySet<string> | null;
  readonly onSelect: (visitId: string, on: boolean) => void;
  readonly chosen: string | null;
  readonly onChoose: (visitId: string) => void;
}

/** The cells to visit, one row a cell however often it was picked. */
export function VisitTable({ visits, selected, onSelect, chosen, onChoose }: VisitTableProps) {
  const columns: DataColumn<Visit>[] = [
    ...VISIT_COLUMNS,
    {
      id: "who",
      head: "Who and when",
      sortBy: (visit) => visit.assignedTo?.name,
      cell: (visit) => <span className="whitespace-nowrap">{whoText(visit)}</span>,
    },
    {
      id: "state",
      head: "State",
      sortBy: (visit) => visit.count.state,
      cell: (visit) => (
        <span>
          <VisitStateLabel state={markOf(visit.count)} />
          {noteOf(visit) !== "" && <span className="q-help block">{noteOf(visit)}</span>}
        </span>
      ),
    },
  ];
  const select: DataColumn<Visit> = {
    id: "select",
    head: <span className="sr-only">Selected</span>,
    cell: (visit) => (
      <input
        type="checkbox"
        className="q-check"
        aria-label={`Select ${visit.label}`}
        checked={selected?.has(visit.id) ?? false}
        onClick={(event) => event.stopPropagation()}
        onChange={(event) => onSelect(visit.id, event.target.checked)}
      />
    ),
  };
  return (
    <DataTable
      dense
      caption="Cells to visit"
      columns={selected === null ? columns : [select, ...columns]}
      rows={visits}
      rowId={(visit) => visit.id}
      chosen={chosen}
      onChoose={onChoose}
      tone={(visit) => (waitsForLead(visit) ? "attention" : undefined)}
      initialSort={{ column: "order", direction: "ascending" }}
      empty="No cell fits the filter."
    />
  );
}

function whoText(visit: Visit): string {
  if (visit.assignedTo === null) return "nobody yet";
  const { name, day } = visit.assignedTo;
  return day === "" ? name : `${name}, ${day}`;
}

/** Reported as not countable, but not closed: no reserve has been opened for it. */
export function waitsForLead(visit: Visit): boolean {
  return visit.state === "in-use" && ["refused", "unsafe", "not-reached", "lost"].includes(visit.count.state);
}

function noteOf(visit: Visit): string {
  if (waitsForLead(visit)) return "reported, not closed yet";
  if (visit.state === "closed") return "closed";
  return visit.openedFor === null ? "" : `reserve, opened for ${visit.openedFor}`;
}
