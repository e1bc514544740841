import { useMemo, useState } from "react";
import { useVisits } from "../../api/visits.ts";
import { markOf, ordersText } from "../../api/visit-words.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatAsIs } from "../../components/ui/format.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { Table } from "../../components/ui/Table.tsx";
import { VISIT_STATE_WORDS } from "../../components/ui/visit-states.ts";
import { COUNT_CLASSES } from "../../map/count-classes.ts";
import { CountsLayer } from "../../map/CountsLayer.tsx";
import { FrameSheetMap } from "../../map/FrameSheetMap.tsx";
import { LegendEntry } from "../../map/LegendEntry.tsx";
import { sheetCount } from "../../map/sheet-counts.ts";

const STEPS = [0, 1, 2, 3, 4, 5] as const;

/** The counts where they stood, and the same in a table. */
export function CountsMap({
  surveyId,
  frameId,
  plural,
}: {
  readonly surveyId: string;
  readonly frameId: string;
  readonly plural: string;
}) {
  const visits = useVisits(surveyId);
  const [chosen, setChosen] = useState<string | null>(null);
  const cells = useMemo(() => visits.data?.visits ?? [], [visits.data]);
  const counts = useMemo(() => cells.map(sheetCount), [cells]);
  if (visits.data === undefined) {
    return visits.isError ? (
      <Refusal error={visits.error} next={<Button onClick={() => void visits.refetch()}>Try again</Button>} />
    ) : (
      <RuledLoading label="Loading the counts" lines={5} />
    );
  }
  return (
    <>
      <FrameSheetMap
        surveyId={surveyId}
        frameId={frameId}
        label={`Where the ${plural} were counted`}
        legend={
          <>
            {STEPS.map((step) => (
              <LegendEntry key={step} symbol={`count-${step}`}>
                {COUNT_CLASSES[step].label}
              </LegendEntry>
            ))}
            <LegendEntry symbol="not-counted">not counted</LegendEntry>
            <LegendEntry symbol="not-visited">not visited yet</LegendEntry>
          </>
        }
      >
        {({ spec, clip }) => (
          <CountsLayer
            counts={counts}
            spec={spec}
            clip={clip}
            chosen={chosen}
            onChoose={(key) => setChosen((before) => (before === key ? null : key))}
          />
        )}
      </FrameSheetMap>
      <Fold quiet title="The same in a table">
        <Table dense caption="Counts by cell">
          <thead>
            <tr>
              <th scope="col">Cell</th>
              <th scope="col">Draw order</th>
              <th scope="col" className="q-num">
                {plural}
              </th>
            </tr>
          </thead>
          <tbody>
            {cells.map((visit) => (
              <tr key={visit.id}>
                <th scope="row">{visit.label}</th>
                <td>{ordersText(visit.orders)}</td>
                <td className="q-num">
                  {visit.count.state === "counted"
                    ? formatAsIs(visit.count.value)
                    : VISIT_STATE_WORDS[markOf(visit.count)]}
                </td>
              </tr>
            ))}
          </tbody>
        </Table>
      </Fold>
    </>
  );
}
