import { useMemo, type ReactNode } from "react";
import type { FrameVersion } from "#shared/api/frame.ts";
import type { CellSpec } from "#shared/frame/cell-spec.ts";
import { Refusal } from "../components/ui/Refusal.tsx";
import { RuledLoading } from "../components/ui/RuledLoading.tsx";
import { AreaOutline } from "./AreaOutline.tsx";
import { useFrameGround } from "./frame-ground.ts";
import { FrameCellsLayer } from "./FrameCellsLayer.tsx";
import { lngLatFromNet } from "./planes.ts";
import type { PlanePolygons } from "./sheet-geometry.ts";
import { SheetMap } from "./SheetMap.tsx";

/** What layers on a frame's sheet are given: its cells' size, and the outline where counts stop at the boundary. */
export interface SheetGround {
  readonly spec: CellSpec;
  readonly clip: PlanePolygons | undefined;
}

interface FrameSheetMapProps {
  readonly surveyId: string;
  readonly frameId: string;
  readonly label: string;
  readonly legend?: ReactNode;
  /** tall: beside a list; otherwise a part of a reading page. At a phone's width both are less than half of the screen. */
  readonly tall?: boolean;
  /** The layer on top: picks, counts, assigned cells. */
  readonly children: (ground: SheetGround) => ReactNode;
}

/** The sheet of a sealed frame with its cells in the background, for whatever stage shows something on it. */
export function FrameSheetMap({ surveyId, frameId, label, legend, tall = false, children }: FrameSheetMapProps) {
  const { frame, plane, cells, error } = useFrameGround(surveyId, frameId);
  const net = plane?.net;
  const lngLatOf = useMemo(() => (net === undefined ? undefined : lngLatFromNet(net)), [net]);
  if (frame === null || plane === null) {
    return error === null ? <RuledLoading label="Loading the map" lines={5} /> : <Refusal error={error} />;
  }
  const spec = frame.spec.cells;
  const clip = clipOf(frame, plane.outline);
  return (
    <div className={tall ? "q-sheet-place q-sheet-place-tall" : "q-sheet-place"}>
      <SheetMap label={label} bounds={plane.bounds} crsName={plane.crs.name} lngLatOf={lngLatOf} legend={legend}>
        <AreaOutline polygons={plane.outline} />
        {cells !== null && <FrameCellsLayer cells={cells} spec={spec} clip={clip} />}
        {children({ spec, clip })}
      </SheetMap>
    </div>
  );
}

function clipOf(frame: FrameVersion, outline: PlanePolygons): PlanePolygons | undefined {
  return frame.spec.countIn === "inside" ? outline : undefined;
}
