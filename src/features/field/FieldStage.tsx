import { useState } from "react";
import type { Visit } from "#shared/api/field.ts";
import { useVisits } from "../../api/visits.ts";
import { isSettled, isVisited, peopleWithCells, waitsForLead } from "../../api/visit-words.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { EmptyState } from "../../components/ui/EmptyState.tsx";
import { formatCount, formatNumber } from "../../components/ui/format.ts";
import { Ledger } from "../../components/ui/Ledger.tsx";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { CellsToVisit } from "./CellsToVisit.tsx";
import { ClosePickDialog } from "./ClosePickDialog.tsx";
import { FieldMap } from "./FieldMap.tsx";
import { Safety } from "./Safety.tsx";
import { WaypointPanel } from "./WaypointPanel.tsx";

export interface FieldStageProps {
  readonly surveyId: string;
  readonly surveyName: string;
  readonly safetyNotes: string;
  readonly mayAssign: boolean;
  readonly mayClose: boolean;
  readonly mayExport: boolean;
  readonly mayEnter: boolean;
  /** Sees only the cells that are theirs. */
  readonly ownOnly: boolean;
  readonly drawTo: string;
  readonly countsTo: string;
}

type Visits = NonNullable<ReturnType<typeof useVisits>["data"]>;

/** The cells to visit: who goes, waypoints, what is done, and what can't be counted. */
export function FieldStage(props: FieldStageProps) {
  const visits = useVisits(props.surveyId);
  if (visits.data === undefined) {
    return (
      <div className="p-8">
        {visits.error === null ? <RuledLoading label="Loading the cells to visit" /> : <Refusal error={visits.error} />}
      </div>
    );
  }
  if (visits.data.visits.length === 0) return <NothingToVisit {...props} />;
  return <Field {...props} data={visits.data} />;
}

function NothingToVisit({ ownOnly, drawTo }: FieldStageProps) {
  return (
    <ReadingPage title="Field">
      {ownOnly ? (
        <EmptyState title="No cells are yours yet">
          A field lead shares the drawn cells out. Yours appear here, with their waypoints.
        </EmptyState>
      ) : (
        <EmptyState title="No cells drawn yet" action={<ButtonLink to={drawTo}>To the draw</ButtonLink>}>
          Crews go to the cells of the live draw. Declare one and draw it first.
        </EmptyState>
      )}
    </ReadingPage>
  );
}

function Field({ data, ...props }: FieldStageProps & { readonly data: Visits }) {
  const [chosen, setChosen] = useState<string | null>(null);
  const [closing, setClosing] = useState<string | null>(null);
  const toClose = data.visits.find(({ id }) => id === closing);
  const reported = data.visits.filter(waitsForLead);
  return (
    <ReadingPage
      title={titleOf(data.visits, props.ownOnly)}
      band={
        <Ledger
          items={ledgerOf(data, props.ownOnly)}
          action={
            // The one filled button of the page is "Share out" where cells can be shared out.
            <ButtonLink variant={props.mayEnter && !props.mayAssign ? "primary" : "quiet"} to={props.countsTo}>
              {props.mayEnter ? "Enter counts" : "To the counts"}
            </ButtonLink>
          }
        />
      }
      margin={<FieldMargin {...props} visits={data.visits} />}
    >
      {props.mayClose && reported.length > 0 && (
        <Banner
          tone="ochre"
          title={`${formatCount(reported.length, "cell was", "cells were")} reported as not countable.`}
        >
          Close each with its reason, and the next reserve opens; or send somebody again.
        </Banner>
      )}
      <FieldMap
        surveyId={props.surveyId}
        frameId={data.frameId}
        visits={data.visits}
        chosen={chosen}
        onChoose={setChosen}
      />
      <CellsToVisit
        surveyId={props.surveyId}
        visits={data.visits}
        mayAssign={props.mayAssign}
        chosen={chosen}
        onChoose={setChosen}
        onClosing={props.mayClose ? setClosing : undefined}
      />
      {toClose !== undefined && (
        <ClosePickDialog
          surveyId={props.surveyId}
          visit={toClose}
          reservesLeft={data.reservesLeft}
          onClose={() => setClosing(null)}
        />
      )}
    </ReadingPage>
  );
}

function FieldMargin({ visits, ...props }: FieldStageProps & { readonly visits: readonly Visit[] }) {
  return (
    <>
      {props.mayExport && (
        <MarginNote title="Waypoints">
          <WaypointPanel
            surveyId={props.surveyId}
            surveyName={props.surveyName}
            visits={visits}
            people={props.ownOnly ? [] : peopleWithCells(visits)}
          />
        </MarginNote>
      )}
      <Safety notes={props.safetyNotes} />
    </>
  );
}

function titleOf(visits: readonly Visit[], ownOnly: boolean): string {
  const settled = visits.filter(isSettled).length;
  const whose = ownOnly ? "your " : "";
  return `${formatNumber(settled)} of ${whose}${formatCount(visits.length, "cell")} settled`;
}

function ledgerOf(data: Visits, ownOnly: boolean) {
  const counted = data.visits.filter(({ count }) => count.state === "counted").length;
  const assigned = data.visits.filter(({ assignedTo }) => assignedTo !== null).length;
  const own = [
    { key: "Counted", value: formatNumber(counted) },
    { key: "Not visited yet", value: formatNumber(data.visits.filter((visit) => !isVisited(visit)).length) },
  ];
  if (ownOnly) return own;
  return [
    ...own,
    { key: "Shared out", value: `${formatNumber(assigned)} of ${formatNumber(data.visits.length)}` },
    { key: "Reserves left", value: formatNumber(data.reservesLeft) },
    { key: "If we stop tonight", value: prefixText(data) },
  ];
}

function prefixText({ completePrefix, picks }: Visits): string {
  if (completePrefix === 0) return "no pick is complete from the first on";
  return completePrefix >= picks ? "every pick is settled" : `picks 1 to ${completePrefix} are complete`;
}
