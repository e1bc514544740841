import { useMemo } from "react";
import type { AreaVersion } from "#shared/api/area.ts";
import type { LngLat } from "#shared/units/metric.ts";
import { formatArea } from "../../components/ui/format.ts";
import { AreaOutline } from "../../map/AreaOutline.tsx";
import { LegendEntry } from "../../map/LegendEntry.tsx";
import { localPlane } from "../../map/planes.ts";
import { SheetMap } from "../../map/SheetMap.tsx";
import { SheetQuestion } from "../../map/SheetQuestion.tsx";

interface AreaSheetProps {
  readonly surveyName: string;
  readonly area: AreaVersion;
  /** A place that a refused file asks about. */
  readonly asked: LngLat | null;
}

/** The study area as a printed sheet, before any grid: longitude and latitude in the margin. */
export function AreaSheet({ surveyName, area, asked }: AreaSheetProps) {
  const plane = useMemo(() => localPlane(area.outline), [area.outline]);
  const { holes, geodesicAreaM2 } = area.report;
  const at = asked === null ? null : plane.planeOf(asked);
  return (
    <SheetMap
      label={`Study area of ${surveyName}, ${formatArea(geodesicAreaM2)}`}
      bounds={plane.bounds}
      crsName={null}
      lngLatOf={plane.lngLatOf}
      legend={
        <>
          <LegendEntry symbol="boundary">boundary as imported</LegendEntry>
          {holes > 0 && <LegendEntry symbol="hole">hole in the file</LegendEntry>}
          {at !== null && <LegendEntry symbol="question">to be mended</LegendEntry>}
        </>
      }
    >
      <AreaOutline polygons={plane.polygons} />
      {at !== null && <SheetQuestion east={at.east} north={at.north} label="in the refused file" />}
    </SheetMap>
  );
}
