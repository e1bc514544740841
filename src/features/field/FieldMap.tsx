import { useMemo } from "react";
import type { Visit } from "#shared/api/field.ts";
import { isSettled } from "../../api/visit-words.ts";
import { CountsLayer } from "../../map/CountsLayer.tsx";
import { FrameSheetMap } from "../../map/FrameSheetMap.tsx";
import { LegendEntry } from "../../map/LegendEntry.tsx";
import { sheetCount } from "../../map/sheet-counts.ts";

interface FieldMapProps {
  readonly surveyId: string;
  readonly frameId: string | null;
  readonly visits: readonly Visit[];
  readonly chosen: string | null;
  readonly onChoose: (visitId: string | null) => void;
}

/** Where the crews still go, and what is settled; choosing a cell shows it in the list. */
export function FieldMap({ surveyId, frameId, visits, chosen, onChoose }: FieldMapProps) {
  const counts = useMemo(() => visits.map(sheetCount), [visits]);
  if (frameId === null) return null;
  return (
    <FrameSheetMap
      surveyId={surveyId}
      frameId={frameId}
      label={`Cells to visit, ${visits.filter(isSettled).length} of ${visits.length} settled`}
      legend={
        <>
          <LegendEntry symbol="not-visited">not visited yet</LegendEntry>
          <LegendEntry symbol="count-0">counted, none found</LegendEntry>
          <LegendEntry symbol="count-3">counted, darker is more</LegendEntry>
          <LegendEntry symbol="not-counted">not counted</LegendEntry>
        </>
      }
    >
      {({ spec, clip }) => (
        <CountsLayer
          counts={counts}
          spec={spec}
          clip={clip}
          chosen={chosen}
          onChoose={(key) => onChoose(key === chosen ? null : key)}
        />
      )}
    </FrameSheetMap>
  );
}
