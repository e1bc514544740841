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
import { ImportCounts } from "./ImportCounts.tsx";
import type { CountTarget } from "./target.ts";

interface CountsStageProps {
  readonly surveyId: string;
  readonly target: CountTarget;
  readonly mayEnter: boolean;
  readonly mayAmend: boolean;
  readonly mayImport: boolean;
  readonly drawTo: string;
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
  if (visits.data.visits.length === 0) {
    return (
      <ReadingPage title="Counts">
        <EmptyState title="No cells to count yet" action={<ButtonLink to={props.drawTo}>To the draw</ButtonLink>}>
          Counts belong to drawn cells. Once a draw is live and cells are shared out, they are written down here.
        </EmptyState>
      </ReadingPage>
    );
  }
  return <Counts {...props} data={visits.data} />;
}

function Counts({ data, ...props }: CountsStageProps & { readonly data: Visits }) {
  const times = useTimes();
  const [open, setOpen] = useState<string | null>(null);
  const { visits } = data;
  const settled = visits.filter(isVisited).length;
  const openNext = (after: string) => {
    const place = visits.findIndex(({ id }) => id === after);
    const next = [...visits.slice(place + 1), ...visits.slice(0, place)].find((visit) => !isVisited(visit));
    setOpen(next?.id ?? null);
  };
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
        chosen={open}
        onChoose={(id) => setOpen((before) => (before === id ? null : id))}
        detail={(visit) =>
          visit.id === open ? (
            <CellCount {...props} key={visit.id} visit={visit} onSaved={() => openNext(visit.id)} />
          ) : undefined
        }
        initialSort={{ column: "order", direction: "ascending" }}
      />
      {props.mayImport && <ImportCounts surveyId={props.surveyId} targetId={props.target.id} />}
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
          <span className="whitespace-nowrap">{`${count.by}, ${times.time(count.at)}${count.amended ? ", amended" : ""}`}</span>
        ),
    },
  ];
}

function ledgerOf(visits: readonly Visit[]) {
  const marks = new Map<VisitMarkState, number>();
  for (const { count } of visits) marks.set(markOf(count), (marks.get(markOf(count)) ?? 0) + 1);
  return [...marks].map(([state, number]) => ({ key: VISIT_STATE_WORDS[state], value: formatNumber(number) }));
}
