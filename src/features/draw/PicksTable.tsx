import { useMemo } from "react";
import type { DrawEntry } from "#shared/api/draw.ts";
import type { DataColumn } from "../../components/ui/data-column.ts";
import { DataTable } from "../../components/ui/DataTable.tsx";
import { formatList, formatNumber } from "../../components/ui/format.ts";
import { RepeatBadge } from "../../components/ui/RepeatBadge.tsx";
import { VisitStateLabel } from "../../components/ui/VisitStateLabel.tsx";

interface PicksTableProps {
  readonly caption: string;
  readonly entries: readonly DrawEntry[];
  /** Unit of the cell that is chosen here and on the map. */
  readonly chosen?: string | null;
  readonly onChoose?: (unit: string) => void;
  readonly maxHeight?: number;
}

/** Entries in draw order, with repeats told on both sides. */
export function PicksTable({ caption, entries, chosen = null, onChoose, maxHeight = 620 }: PicksTableProps) {
  const columns = useMemo(() => columnsFor(entries), [entries]);
  return (
    <DataTable
      dense
      caption={caption}
      columns={columns}
      rows={entries}
      rowId={rowOf}
      chosen={chosenRow(entries, chosen)}
      {...(onChoose !== undefined && { onChoose: (_: string, entry: DrawEntry) => onChoose(String(entry.unit)) })}
      tone={(entry) => (entry.state === "closed" ? "attention" : undefined)}
      maxHeight={maxHeight}
    />
  );
}

function columnsFor(entries: readonly DrawEntry[]): readonly DataColumn<DrawEntry>[] {
  const places = placesByUnit(entries);
  return [
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
      cell: (entry) => <Repeat entry={entry} places={places.get(entry.unit) ?? []} />,
    },
    { id: "state", head: "State", sortBy: stateText, cell: (entry) => <EntryState entry={entry} /> },
  ];
}

/** A reserve that is not in use. */
const waits = ({ state }: DrawEntry): boolean => state === "reserve" || state === "passed-over";

const rowOf = ({ unit, position }: DrawEntry): string => `${unit}/${position}`;

function chosenRow(entries: readonly DrawEntry[], chosen: string | null): string | null {
  const entry = chosen === null ? undefined : entries.find(({ unit }) => String(unit) === chosen);
  return entry === undefined ? null : rowOf(entry);
}

/** Every place of each unit among the entries that were in use, in draw order. */
function placesByUnit(entries: readonly DrawEntry[]): Map<number, number[]> {
  const places = new Map<number, number[]>();
  for (const { unit, position } of entries.filter((entry) => !waits(entry))) {
    const known = places.get(unit);
    if (known === undefined) places.set(unit, [position]);
    else known.push(position);
  }
  return places;
}

/** A cell that was picked again says where; the pick that repeats one says which. Reserves that wait repeat nothing yet. */
function Repeat({ entry, places }: { readonly entry: DrawEntry; readonly places: readonly number[] }) {
  if (waits(entry)) return entry.repeatOf === null ? null : `would repeat pick ${formatNumber(entry.repeatOf)}`;
  if (entry.repeatOf !== null) {
    return (
      <span className="q-state">
        <RepeatBadge times={Math.max(2, places.length)} /> {`of pick ${formatNumber(entry.repeatOf)}`}
      </span>
    );
  }
  const later = places.filter((place) => place > entry.position);
  if (later.length === 0) return null;
  return (
    <span className="q-state">
      <RepeatBadge times={places.length} open /> {`again at ${formatList(later.map((place) => formatNumber(place)))}`}
    </span>
  );
}

/** What stands below the state of a count, or in its place while the entry waits. */
function stateText(entry: DrawEntry): string {
  switch (entry.state) {
    case "reserve":
      return "waits, in order";
    case "passed-over":
      return "passed over: its cell is closed";
    case "closed":
      return `${entry.count}, closed`;
    case "in-use":
      return entry.count;
  }
}

function EntryState({ entry }: { readonly entry: DrawEntry }) {
  if (waits(entry)) return stateText(entry);
  const notes = [
    entry.state === "closed" ? "closed" : "",
    entry.openedFor === null ? "" : `reserve, opened for pick ${formatNumber(entry.openedFor)}`,
  ].filter((note) => note !== "");
  return (
    <span>
      <VisitStateLabel state={entry.count} />
      {notes.length > 0 && <span className="q-help block">{notes.join("; ")}</span>}
    </span>
  );
}
