import type { ImportVerdict } from "#shared/api/counts.ts";
import type { DataColumn } from "../../components/ui/data-column.ts";
import { DataTable } from "../../components/ui/DataTable.tsx";
import { formatCount, formatNumber } from "../../components/ui/format.ts";

type Row = ImportVerdict["rows"][number];
type Verdict = Row["verdict"];

const VERDICT_WORDS = {
  new: "will be written",
  same: "there already",
  different: "differs from what is there",
  "not-drawn": "not drawn, not used",
  empty: "no count in this row",
  question: "waits for your answer",
  refused: "not taken",
} as const satisfies Record<Verdict, string>;

/** The same under a number of rows. */
const VERDICT_PLURALS: Readonly<Record<Verdict, string>> = {
  ...VERDICT_WORDS,
  different: "differ from what is there",
  question: "wait for your answer",
};

const VERDICTS = Object.keys(VERDICT_WORDS) as Verdict[];

function wordOf(verdict: Verdict, written: boolean, rows = 1): string {
  if (verdict === "new" && written) return "written";
  return (rows === 1 ? VERDICT_WORDS : VERDICT_PLURALS)[verdict];
}

/** Day and observer come as columns of their own only where the table tells them. */
function columnsFor({ rows, written }: ImportVerdict): DataColumn<Row>[] {
  const day: DataColumn<Row> = { id: "day", head: "Counted on", sortBy: (row) => row.day, cell: (row) => row.day };
  const by: DataColumn<Row> = { id: "by", head: "By", sortBy: (row) => row.by, cell: (row) => row.by };
  return [
    { id: "row", head: "Row", numeric: true, sortBy: (row) => row.row, cell: (row) => formatNumber(row.row) },
    { id: "cell", head: "Cell", sortBy: (row) => row.cell, cell: (row) => <b>{row.cell}</b> },
    { id: "said", head: "Says", cell: (row) => row.said },
    ...(rows.some((row) => row.day !== "") ? [day] : []),
    ...(rows.some((row) => row.by !== "") ? [by] : []),
    {
      id: "verdict",
      head: "Verdict",
      sortBy: (row) => row.verdict,
      cell: (row) => (
        <span>
          <b>{wordOf(row.verdict, written)}</b>
          {row.message !== "" && !(written && row.verdict === "new") && (
            <span className="q-help block">{row.message}</span>
          )}
          {row.flag !== "" && <span className="q-help block">{row.flag}</span>}
        </span>
      ),
    },
  ];
}

/** How each row of the table is read, and how many of each kind there are. */
export function VerdictTable({ verdict }: { readonly verdict: ImportVerdict }) {
  const { rows, numbers, written } = verdict;
  const all = VERDICTS.reduce((sum, kind) => sum + numbers[kind], 0);
  return (
    <div className="grid gap-2">
      <ul className="flex flex-wrap gap-x-6 gap-y-1" aria-label="Rows by verdict">
        {VERDICTS.filter((kind) => numbers[kind] > 0).map((kind) => (
          <li key={kind}>
            <b>{formatNumber(numbers[kind])}</b> {wordOf(kind, written, numbers[kind])}
          </li>
        ))}
      </ul>
      {rows.length < all && (
        <p className="q-help">
          {`${formatCount(rows.length, "row")} of ${formatNumber(all)} are listed: first those that ask, are refused, differ or are written.`}
        </p>
      )}
      <DataTable
        dense
        caption="Rows of the table and how they are read"
        columns={columnsFor(verdict)}
        rows={rows}
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
