import { useState } from "react";
import type { Visit } from "#shared/api/field.ts";
import { useVisits } from "../../api/visits.ts";
import { isVisited, markOf } from "../../api/visit-words.ts";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import type { DataColumn } from "../../components/ui/data-column.ts";
import { DataTable } from "../../components/ui/DataTable.tsx";
import { EmptyState } from "../../components/ui/EmptyState.tsx";
import { formatAsIs, formatCount, formatNumber, type Times } from "../../components/ui/format.ts";
import { Ledger } from "../../components/ui/Ledger.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { VISIT_STATE_WORDS, type VisitMarkState } from "../../components/ui/visit-states.ts";
import { VisitStateLabel } from "../../components/ui/VisitStateLabel.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { VISIT_COLUMNS } from "../../components/visits/visit-columns.tsx";
import { CellCount } from "./CellCount.tsx";
import { useDrafts } from "./drafts.ts";
import { ImportCounts } from "./ImportCounts.tsx";
import { madeText } from "./said-text.ts";
import type { CountTarget } from "./target.ts";
import { useTableImport } from "./use-table-import.ts";

interface CountsStageProps {
  readonly surveyId: string;
  readonly target: CountTarget;
  readonly mayEnter: boolean;
  readonly mayAmend: boolean;
  readonly mayImport: boolean;
  /** Where cells are drawn, for those who may; null for the others. */
  readonly drawTo: string | null;
}

type Visits = NonNullable<ReturnType<typeof useVisits>["data"]>;

/** Cells with what is known of each, one form open at a time, and tables of counts. */
export function CountsStage(props: CountsStageProps) {
  const visits = useVisits(props.surveyId);
  if (visits.data === undefined) {
    return (
      <div className="p-8">
        {visits.error === null ? <RuledLoading label="Loading the counts" /> : <Refusal error={visits.error} />}
      </div>
    );
  }
  if (visits.data.visits.length === 0) return <NothingToCount {...props} drawn={visits.data.drawId !== null} />;
  return <Counts {...props} data={visits.data} />;
}

/** Nothing is drawn yet; or cells are, and none of them is this person's. */
function NothingToCount({ drawn, drawTo }: CountsStageProps & { readonly drawn: boolean }) {
  const action = drawn || drawTo === null ? undefined : <ButtonLink to={drawTo}>To the draw</ButtonLink>;
  return (
    <ReadingPage title="Counts">
      <EmptyState title={drawn ? "No cell is given to you yet" : "No cells to count yet"} action={action}>
        {drawn
          ? "The field lead shares the drawn cells out. Yours are written down here once you have some."
          : "Counts belong to drawn cells. Once a planner has drawn them, they are written down here."}
      </EmptyState>
    </ReadingPage>
  );
}

function Counts({ data, ...props }: CountsStageProps & { readonly data: Visits }) {
  const times = useTimes();
  const drafts = useDrafts();
  const table = useTableImport(props.surveyId, props.target.id);
  const [open, setOpen] = useState<{ readonly id: string; readonly afterAnother: boolean } | null>(null);
  const { visits } = data;
  const settled = visits.filter(isVisited).length;
  const openNext = (after: string) => {
    const place = visits.findIndex(({ id }) => id === after);
    const next = [...visits.slice(place + 1), ...visits.slice(0, place)].find((visit) => !isVisited(visit));
    setOpen(next === undefined ? null : { id: next.id, afterAnother: true });
  };
  // One filled button a screen: a table that is ready to be written has it.
  const tableIsReady = table.verdict !== null && !table.verdict.written && table.verdict.toWrite > 0;
  return (
    <ReadingPage
      title={`${formatNumber(settled)} of ${formatCount(visits.length, "cell")} written down`}
      lead="Zero is a count. An empty field is not: it means that nobody was there yet."
      band={<Ledger items={ledgerOf(visits)} />}
    >
      <DataTable
        caption="Cells and their counts"
        columns={columnsFor(props.target.plural, times)}
        rows={visits}
        rowId={(visit) => visit.id}
        chosen={open?.id ?? null}
        onChoose={(id) => setOpen((before) => (before?.id === id ? null : { id, afterAnother: false }))}
        detail={(visit) =>
          visit.id === open?.id ? (
            // A table wider than the page is passed under what is open.
            <div className="sticky left-2 max-w-[min(100%,calc(100vw-3rem))]">
              <CellCount
                {...props}
                key={visit.id}
                visit={visit}
                drafts={drafts}
                focused={open.afterAnother}
                primary={!tableIsReady}
                onSaved={() => openNext(visit.id)}
              />
            </div>
          ) : undefined
        }
        initialSort={{ column: "order", direction: "ascending" }}
      />
      {props.mayImport && <ImportCounts table={table} />}
      {!props.mayEnter && <Section title="Reading only">Your role here reads the counts and changes none.</Section>}
    </ReadingPage>
  );
}

function columnsFor(plural: string, times: Times): DataColumn<Visit>[] {
  return [
    ...VISIT_COLUMNS,
    {
      id: "state",
      head: "State",
      sortBy: (visit) => markOf(visit.count),
      cell: (visit) => <VisitStateLabel state={markOf(visit.count)} />,
    },
    {
      id: "count",
      head: plural,
      numeric: true,
      sortBy: ({ count }) => (count.state === "counted" ? count.value : null),
      cell: ({ count }) => (count.state === "counted" ? formatAsIs(count.value) : "no count"),
    },
    {
      id: "by",
      head: "By",
      cell: ({ count }) =>
        count.state === "not-visited" ? (
          ""
        ) : (
          <span className="whitespace-nowrap">{`${count.by}, ${madeText(times, count.at)}${count.amended ? ", amended" : ""}`}</span>
        ),
    },
  ];
}

function ledgerOf(visits: readonly Visit[]) {
  const marks = new Map<VisitMarkState, number>();
  for (const { count } of visits) marks.set(markOf(count), (marks.get(markOf(count)) ?? 0) + 1);
  return [...marks].map(([state, number]) => ({ key: VISIT_STATE_WORDS[state], value: formatNumber(number) }));
}
