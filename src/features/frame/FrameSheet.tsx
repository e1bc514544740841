import { useCallback, useMemo } from "react";
import type { CellAddress, CellSpec, EdgePresetName } from "#shared/frame/cell-spec.ts";
import type { FrameCells } from "#shared/frame/cells.ts";
import { formatMetres } from "../../components/ui/format.ts";
import { AreaOutline } from "../../map/AreaOutline.tsx";
import { CellCallout } from "../../map/CellCallout.tsx";
import { FrameCellsLayer } from "../../map/FrameCellsLayer.tsx";
import type { ShownPlane } from "../../map/frame-ground.ts";
import { LegendEntry } from "../../map/LegendEntry.tsx";
import { lngLatFromNet } from "../../map/planes.ts";
import { SheetMap } from "../../map/SheetMap.tsx";
import { cellWords } from "./cell-words.ts";
import { HoveredCell } from "./HoveredCell.tsx";

interface FrameSheetProps {
  readonly surveyName: string;
  readonly plane: ShownPlane;
  readonly cells: FrameCells | null;
  readonly spec: CellSpec | null;
  readonly preset: EdgePresetName;
  readonly chosen: CellAddress | null;
  readonly onChoose: (cell: CellAddress | null) => void;
}

/** The study area on the frame's plane with its cells; a press on one tells its label, unit and share. */
export function FrameSheet({ surveyName, plane, cells, spec, preset, chosen, onChoose }: FrameSheetProps) {
  const lngLatOf = useMemo(() => lngLatFromNet(plane.net), [plane.net]);
  const choose = useCallback(
    (column: number, row: number) => {
      const again = chosen?.column === column && chosen.row === row;
      onChoose(again || cells === null || cellWords(cells, { column, row }) === null ? null : { column, row });
    },
    [cells, chosen, onChoose],
  );
  const words = chosen === null || cells === null ? null : cellWords(cells, chosen);
  const grid = spec === null ? "" : ` with squares of ${formatMetres(spec.widthMm / 1000)}`;
  return (
    <SheetMap
      label={`Study area of ${surveyName}${grid}`}
      bounds={plane.bounds}
      crsName={plane.crs.name}
      lngLatOf={lngLatOf}
      legend={
        <>
          <LegendEntry symbol="whole-cell">whole cell</LegendEntry>
          <LegendEntry symbol="edge-cell">cell cut by the boundary</LegendEntry>
          <LegendEntry symbol="boundary">boundary</LegendEntry>
          {plane.holes > 0 && <LegendEntry symbol="hole">hole in the area</LegendEntry>}
        </>
      }
    >
      <AreaOutline polygons={plane.outline} />
      {cells !== null && spec !== null && (
        <>
          <FrameCellsLayer
            cells={cells}
            spec={spec}
            clip={preset === "clip" ? plane.outline : undefined}
            onChoose={choose}
          />
          <HoveredCell cells={cells} spec={spec} chosen={chosen} />
          {chosen !== null && words !== null && (
            <CellCallout spec={spec} column={chosen.column} row={chosen.row} {...words} />
          )}
        </>
      )}
    </SheetMap>
  );
}
