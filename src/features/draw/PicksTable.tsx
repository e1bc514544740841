import type { DrawEntry } from "#shared/api/draw.ts";
import type { DataColumn } from "../../components/ui/data-column.ts";
import { DataTable } from "../../components/ui/DataTable.tsx";
import { formatNumber } from "../../components/ui/format.ts";
import { RepeatBadge } from "../../components/ui/RepeatBadge.tsx";
import { VisitStateLabel } from "../../components/ui/VisitStateLabel.tsx";

interface PicksTableProps {
  readonly caption: string;
  readonly entries: readonly DrawEntry[];
  readonly chosen: string | null;
  readonly onChoose: (unit: string) => void;
  /** Reserves that wait show that in place of a count's state. */
  readonly waiting?: boolean;
}

/** Entries in draw order, with repeats told on both sides. */
export function PicksTable({ caption, entries, chosen, onChoose, waiting = false }: PicksTableProps) {
  const again = laterPositions(entries);
  const columns: readonly DataColumn<DrawEntry>[] = [
    {
      id: "order",
      head: "Order",
      numeric: true,
      sortBy: (entry) => entry.position,
      cell: (entry) => formatNumber(entry.position),
    },
    { id: "cell", head: "Cell", sortBy: (entry) => entry.label, cell: (entry) => <b>{entry.label}</b> },
    {
      id: "unit",
      head: "Unit",
      numeric: true,
      sortBy: (entry) => entry.unit,
      cell: (entry) => formatNumber(entry.unit),
    },
    {
      id: "repeat",
      head: "Repeat",
      cell: (entry) => <Repeat entry={entry} again={again.get(entry.position) ?? null} />,
    },
    {
      id: "state",
      head: "State",
      sortBy: (entry) => entry.state + entry.count,
      cell: (entry) => (waiting ? waitingWords(entry) : <EntryState entry={entry} />),
    },
  ];
  return (
    <DataTable
      dense
      caption={caption}
      columns={columns}
      rows={entries}
      rowId={(entry) => `${entry.unit}/${entry.position}`}
      chosen={chosenRow(entries, chosen)}
      onChoose={(_, entry) => onChoose(String(entry.unit))}
      tone={(entry) => (entry.state === "closed" ? "attention" : undefined)}
      maxHeight={620}
    />
  );
}

function chosenRow(entries: readonly DrawEntry[], chosen: string | null): string | null {
  const entry = entries.find(({ unit }) => String(unit) === chosen);
  return entry === undefined ? null : `${entry.unit}/${entry.position}`;
}

/** Position of an entry → the next position that repeats its cell. */
function laterPositions(entries: readonly DrawEntry[]): Map<number, number> {
  const later = new Map<number, number>();
  for (const { repeatOf, position } of entries) {
    if (repeatOf !== null && !later.has(repeatOf)) later.set(repeatOf, position);
  }
  return later;
}

function Repeat({ entry, again }: { readonly entry: DrawEntry; readonly again: number | null }) {
  if (entry.repeatOf !== null) {
    return (
      <span className="q-state">
        <RepeatBadge times={2} /> {`of pick ${entry.repeatOf}`}
      </span>
    );
  }
  if (again === null) return null;
  return (
    <span className="q-state">
      <RepeatBadge times={2} open /> {`again at ${again}`}
    </span>
  );
}

function EntryState({ entry }: { readonly entry: DrawEntry }) {
  const label = <VisitStateLabel state={entry.count} />;
  if (entry.openedFor === null) return label;
  return (
    <span>
      {label}
      <span className="q-help block">{`reserve, opened for ${entry.openedFor}`}</span>
    </span>
  );
}

function waitingWords(entry: DrawEntry): string {
  return entry.state === "passed-over" ? "passed over: its cell is closed" : "waits, in order";
}
