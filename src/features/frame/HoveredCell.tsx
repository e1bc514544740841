import { useEffect, useState } from "react";
import { useMap } from "react-leaflet";
import type { CellAddress, CellSpec } from "#shared/frame/cell-spec.ts";
import type { FrameCells } from "#shared/frame/cells.ts";
import { CellCallout } from "../../map/CellCallout.tsx";
import { cellAt } from "../../map/sheet-geometry.ts";
import { cellWords } from "./cell-words.ts";

interface HoveredCellProps {
  readonly cells: FrameCells;
  readonly spec: CellSpec;
  /** Not told again on hover. */
  readonly chosen: CellAddress | null;
}

const same = (a: CellAddress | null, b: CellAddress | null) => a?.column === b?.column && a?.row === b?.row;

/** What lies under the pointer, told on the sheet. */
export function HoveredCell({ cells, spec, chosen }: HoveredCellProps) {
  const map = useMap();
  const [hovered, setHovered] = useState<CellAddress | null>(null);
  useEffect(() => {
    const move = (event: { latlng: { lat: number; lng: number } }) => {
      const next = cellAt(spec, event.latlng.lng, event.latlng.lat);
      setHovered((before) => (same(before, next) ? before : next));
    };
    const leave = () => setHovered(null);
    map.on("mousemove", move);
    map.on("mouseout", leave);
    return () => {
      map.off("mousemove", move);
      map.off("mouseout", leave);
    };
  }, [map, spec]);
  const words = hovered === null || same(hovered, chosen) ? null : cellWords(cells, hovered);
  if (hovered === null || words === null) return null;
  return <CellCallout quiet spec={spec} column={hovered.column} row={hovered.row} {...words} />;
}
