import type { ImportVerdict } from "#shared/api/counts.ts";
import type { DataColumn } from "../../components/ui/data-column.ts";
import { DataTable } from "../../components/ui/DataTable.tsx";
import { formatNumber } from "../../components/ui/format.ts";

type Row = ImportVerdict["rows"][number];

const VERDICT_WORDS = {
  new: "will be written",
  same: "there already",
  different: "differs from what is there",
  "not-drawn": "not drawn, not used",
  empty: "no count in this row",
  question: "asks you",
  refused: "not taken",
} as const satisfies Record<Row["verdict"], string>;

const COLUMNS: readonly DataColumn<Row>[] = [
  { id: "row", head: "Row", numeric: true, sortBy: (row) => row.row, cell: (row) => formatNumber(row.row) },
  { id: "cell", head: "Cell", sortBy: (row) => row.cell, cell: (row) => <b>{row.cell}</b> },
  { id: "said", head: "Says", cell: (row) => row.said },
  {
    id: "verdict",
    head: "Verdict",
    sortBy: (row) => row.verdict,
    cell: (row) => (
      <span>
        <b>{VERDICT_WORDS[row.verdict]}</b>
        {row.message !== "" && <span className="q-help block">{row.message}</span>}
        {row.flag !== "" && <span className="q-help block">{row.flag}</span>}
      </span>
    ),
  },
];

/** How each row of the table is read, and how many of each kind there are. */
export function VerdictTable({ verdict }: { readonly verdict: ImportVerdict }) {
  const counts = new Map<Row["verdict"], number>();
  for (const row of verdict.rows) counts.set(row.verdict, (counts.get(row.verdict) ?? 0) + 1);
  return (
    <div className="grid gap-2">
      <ul className="flex flex-wrap gap-x-6 gap-y-1" aria-label="Rows by verdict">
        {[...counts].map(([kind, number]) => (
          <li key={kind}>
            <b>{formatNumber(number)}</b> {VERDICT_WORDS[kind]}
          </li>
        ))}
      </ul>
      <DataTable
        dense
        caption="Rows of the table and how they are read"
        columns={COLUMNS}
        rows={verdict.rows}
        rowId={(row) => String(row.row)}
        tone={toneOf}
        maxHeight={420}
      />
    </div>
  );
}

function toneOf(row: Row): "attention" | "refused" | undefined {
  if (row.verdict === "refused") return "refused";
  return row.verdict === "question" || row.verdict === "different" || row.flag !== "" ? "attention" : undefined;
}
