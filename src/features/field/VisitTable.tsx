import type { Visit } from "#shared/api/field.ts";
import { markOf, waitsForLead } from "../../api/visit-words.ts";
import type { DataColumn } from "../../components/ui/data-column.ts";
import { DataTable } from "../../components/ui/DataTable.tsx";
import { VisitStateLabel } from "../../components/ui/VisitStateLabel.tsx";
import { VISIT_COLUMNS } from "../../components/visits/visit-columns.tsx";
import { VisitDetail } from "./VisitDetail.tsx";

interface VisitTableProps {
  readonly visits: readonly Visit[];
  /** Selected for sharing out; null where nothing can be shared out. */
  readonly selected: ReadonlySet<string> | null;
  readonly onSelect: (visitId: string, on: boolean) => void;
  readonly chosen: string | null;
  readonly onChoose: (visitId: string) => void;
  /** Asks to close a cell; absent where that may not be done. */
  readonly onClosing: ((visitId: string) => void) | undefined;
}

const COLUMNS: readonly DataColumn<Visit>[] = [
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

/** The cells to visit, one row a cell however often it was picked; the chosen one opens below its row. */
export function VisitTable({ visits, selected, onSelect, chosen, onChoose, onClosing }: VisitTableProps) {
  return (
    <DataTable
      dense
      caption="Cells to visit"
      columns={
        selected === null
          ? COLUMNS
          : COLUMNS.map((column) => (column.id === "cell" ? tickedColumn(column, selected, onSelect) : column))
      }
      rows={visits}
      rowId={(visit) => visit.id}
      chosen={chosen}
      onChoose={onChoose}
      tone={(visit) => (waitsForLead(visit) ? "attention" : undefined)}
      detail={(visit) => visit.id === chosen && <VisitDetail visit={visit} onClosing={onClosing} />}
      initialSort={{ column: "order", direction: "ascending" }}
      empty="No cell fits the filter."
    />
  );
}

/** The cell's column with a box to tick, so that both stay in sight when the others scroll; around the box it ticks as well. */
function tickedColumn(
  column: DataColumn<Visit>,
  selected: ReadonlySet<string>,
  onSelect: VisitTableProps["onSelect"],
): DataColumn<Visit> {
  return {
    ...column,
    cell: (visit) => (
      <span className="whitespace-nowrap">
        <label className="q-check-cell" onClick={(event) => event.stopPropagation()}>
          <input
            type="checkbox"
            className="q-check"
            aria-label={`Select ${visit.label}`}
            checked={selected.has(visit.id)}
            onChange={(event) => onSelect(visit.id, event.target.checked)}
          />
        </label>{" "}
        {column.cell(visit)}
      </span>
    ),
  };
}

function whoText(visit: Visit): string {
  if (visit.assignedTo === null) return "nobody yet";
  const { name, day } = visit.assignedTo;
  return day === "" ? name : `${name}, ${day}`;
}

function noteOf(visit: Visit): string {
  if (waitsForLead(visit)) return "reported, not closed yet";
  if (visit.state === "closed") return "closed";
  return visit.openedFor === null ? "" : `reserve, opened for pick ${visit.openedFor}`;
}
